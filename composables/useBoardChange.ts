import { FetchError } from 'ofetch'

/** The sentences that the server says of a refused request, the fields' own first. */
function sentenceOf(error: unknown): string {
  if (!(error instanceof FetchError) || !error.data) return 'The server did not answer. Check the connection and try again; what you typed is kept.'
  const issues = (error.data.data?.issues ?? []) as { message: string }[]
  return issues.map(issue => issue.message).join(' ') || error.data.message || 'That did not work. Try again.'
}

/**
 * Sends one small change of the board, such as a closure.
 *
 * @returns a function that resolves with whether it was accepted, whether it is under way, and why it was refused
 */
export function useBoardChange() {
  const isSending = ref(false)
  const refusal = ref('')

  async function send(path: string, options: { method: 'POST' | 'DELETE', body?: Record<string, unknown> }): Promise<boolean> {
    if (isSending.value) return false
    isSending.value = true
    refusal.value = ''
    try {
      await $fetch<unknown>(path, options)
      return true
    }
    catch (error) {
      refusal.value = sentenceOf(error)
      return false
    }
    finally {
      isSending.value = false
    }
  }

  return { send, isSending, refusal }
}
