import { planEstimateSchema } from '#shared/schemas/run'
import type { PlanEstimateReply } from '#shared/types/plan'

const WAIT_MS = 350

/** Hours, litres and price of a plan, computed again a moment after the last change. Incomplete plans have none. */
export function usePlanEstimate(plan: () => Record<string, unknown>) {
  const reply = ref<PlanEstimateReply | null>(null)
  const refusal = ref('')
  const busy = ref(false)
  let timer: ReturnType<typeof setTimeout> | undefined
  let latest = 0

  async function compute(input: Record<string, unknown>) {
    const order = ++latest
    busy.value = true
    try {
      const fresh = await $fetch<PlanEstimateReply>('/api/plan/estimate', { method: 'POST', body: input, retry: 0 })
      if (order === latest) [reply.value, refusal.value] = [fresh, '']
    }
    catch (error) {
      if (order !== latest) return
      const { statusCode, data } = error as { statusCode?: number, data?: { message?: string, data?: { issues?: { message: string }[] } } }
      reply.value = null
      refusal.value = statusCode === undefined ? 'The server did not answer. Check the connection; the plan is kept.' : data?.data?.issues?.[0]?.message ?? data?.message ?? ''
    }
    finally {
      if (order === latest) busy.value = false
    }
  }

  watch(plan, (input) => {
    clearTimeout(timer)
    if (!planEstimateSchema.safeParse(input).success) {
      latest += 1
      reply.value = null
      busy.value = false
      return
    }
    timer = setTimeout(() => void compute(input), WAIT_MS)
  }, { deep: true })

  return { reply, refusal, busy }
}
