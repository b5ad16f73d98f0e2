import { planEstimateSchema } from '#shared/schemas/run'
import type { PlanEstimateReply } from '#shared/types/plan'
import { estimatePlan } from '#server/services/plan/estimate-plan'
import { countCompeting, findSlotConflicts, slotOf } from '#server/services/runs/ask-for-run'
import { defineApi } from '#server/utils/define-api'

/** Hours, litres and price of a plan; with a start, also what it collides with. */
export default defineApi({ access: 'run:ask', body: planEstimateSchema }, async ({ db, actor, body, now }): Promise<PlanEstimateReply> => {
  const { startsAt, ...plan } = body
  const planned = await estimatePlan(db, { plan, actor, now })
  const slot = startsAt ? slotOf(startsAt, planned) : null
  return {
    estimate: planned.estimate,
    quote: planned.quote,
    currency: planned.facility.currency,
    rateCard: planned.rateCard.name,
    endsAt: slot?.endsAt.toISOString() ?? null,
    conflicts: slot ? (await findSlotConflicts(db, plan.cryostatId, slot)).map(({ kind, label, startsAt: from, endsAt: to }) => ({ kind, label, startsAt: from.toISOString(), endsAt: to.toISOString() })) : [],
    competing: slot ? await countCompeting(db, plan.cryostatId, slot) : 0,
  }
})
