import type { FormContext } from 'vee-validate'
import { useToastsStore } from '~/stores/toasts'

/** What the server says of a refusal. */
interface Refusal { statusCode?: number, message?: string, data?: { code?: string, issues?: { path: (string | number)[], message: string }[] } }

/** How a form is sent. */
export interface SubmitOptions { method?: 'POST' | 'PUT' | 'DELETE', body?: Record<string, unknown>, form?: Pick<FormContext, 'setErrors'>, done?: string }

/**
 * Sends a form: once at a time, with what the server refuses put at its fields, and a sentence for a lost connection or
 * an ended session. What was typed is never touched.
 *
 * @returns `submit`, which resolves with the reply or null when refused; `busy`; and `refusal`, the sentence to show
 */
export function useSubmit() {
  const busy = ref(false)
  const refusal = ref('')
  const route = useRoute()
  const toasts = useToastsStore()

  async function submit<T = unknown>(url: string, { method = 'POST', body = {}, form, done }: SubmitOptions = {}): Promise<T | null> {
    if (busy.value) return null
    busy.value = true
    refusal.value = ''
    try {
      const reply = await $fetch<T>(url, { method, body: method === 'DELETE' ? undefined : body, retry: 0 })
      if (done) toasts.show(done)
      return reply as T
    }
    catch (error) {
      const { statusCode, data } = error as { statusCode?: number, data?: Refusal }
      refusal.value = sentenceOf(statusCode, data)
      const issues = data?.data?.issues ?? []
      form?.setErrors(Object.fromEntries(issues.map(issue => [issue.path.join('.'), issue.message])))
      return null
    }
    finally {
      busy.value = false
    }
  }

  function sentenceOf(statusCode: number | undefined, data: Refusal | undefined): string {
    if (statusCode === undefined) return 'The server did not answer. Check the connection and try again; what you typed is kept.'
    if (statusCode === 401) return `Your session has ended. Sign in again in another tab (${location.origin}/sign-in?return=${encodeURIComponent(route.fullPath)}), then press the button once more; what you typed is kept.`
    return data?.message ?? 'This could not be done. Try again.'
  }

  return { submit, busy, refusal }
}
