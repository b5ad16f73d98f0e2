import { defineStore } from 'pinia'

/** A line of the run sheet that the server has not taken yet. */
export interface QueuedEntry { personId: string, runId: string, clientKey: string, body: Record<string, unknown>, refusal: string | null }

const KEY = 'holdtime-entry-queue'
const RETRY_MS = 5000

/**
 * Lines of the run sheet on their way. On a shared terminal each person's lines wait for that person to sign in again.
 * They survive a lost connection and a reload; the client key makes sending one
 * twice record it once. A line that the server refuses stays, with its sentence, until it is corrected or dropped.
 */
export const useEntryQueueStore = defineStore('entry-queue', () => {
  const all = ref<QueuedEntry[]>([])
  const { data: session } = useAuth()
  const personId = computed(() => session.value?.user.personId ?? '')
  const entries = computed(() => all.value.filter(entry => entry.personId === personId.value))
  const isSending = ref(false)
  let timer: ReturnType<typeof setTimeout> | undefined

  function keep() {
    localStorage.setItem(KEY, JSON.stringify(all.value))
  }

  function load() {
    if (import.meta.client) all.value = JSON.parse(localStorage.getItem(KEY) ?? '[]') as QueuedEntry[]
  }

  function add(runId: string, body: Record<string, unknown>) {
    all.value.push({ personId: personId.value, runId, clientKey: String(body.clientKey), body, refusal: null })
    keep()
  }

  function drop(clientKey: string) {
    all.value = all.value.filter(entry => entry.clientKey !== clientKey)
    keep()
  }

  /** Sends what waits, oldest first. Resolves with the remark of the last line taken, if it has one. */
  async function send(): Promise<{ taken: number, remark: string | null, outsideUsual: boolean }> {
    clearTimeout(timer)
    const reply = { taken: 0, remark: null as string | null, outsideUsual: false }
    if (isSending.value) return reply
    isSending.value = true
    try {
      for (const entry of entries.value.filter(candidate => candidate.refusal === null)) {
        try {
          const recorded = await $fetch<{ remark: string | null, outsideUsual: boolean }>(`/api/runs/${entry.runId}/entries`, { method: 'POST', body: entry.body, retry: 0 })
          reply.taken += 1
          reply.remark = recorded.remark
          reply.outsideUsual = recorded.outsideUsual
          drop(entry.clientKey)
        }
        catch (error) {
          const { statusCode, data } = error as { statusCode?: number, data?: { message?: string, data?: { issues?: { message: string }[] } } }
          if (statusCode === undefined || statusCode >= 500 || statusCode === 401) {
            timer = setTimeout(() => void send(), RETRY_MS)
            break
          }
          entry.refusal = data?.data?.issues?.[0]?.message ?? data?.message ?? 'This line was refused.'
          keep()
        }
      }
    }
    finally {
      isSending.value = false
    }
    return reply
  }

  return { entries, isSending, load, add, drop, send }
})
