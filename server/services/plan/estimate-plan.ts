import { and, eq, inArray, sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { handbookEntry } from '#shared/materials/elements'
import { cryostatPlanningFacts } from '#shared/planning/cryostat-facts'
import { estimateRun } from '#shared/planning/estimate'
import { expectedHeatCapacity } from '#shared/planning/measurement'
import type { PlannedSample, RunEstimate } from '#shared/planning/types'
import { type Quote, quoteRun } from '#shared/pricing/quote'
import { cardInForce } from '#shared/pricing/rate-card'
import type { PlanEstimateInput } from '#shared/schemas/run'
import { wallTimeOf } from '#shared/time/facility-time'
import type { Database } from '#server/db/client'
import { cryostats, groups, rateCardPrices, rateCards, samples } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { type Facility, readFacility } from '#server/services/facility/queries'
import { readFinishedRuns } from './history'

/** What the sample's heat capacity is taken for while nothing is known of it: a Debye temperature of 250 K and a small γ (common practice, no source). */
const UNKNOWN_SAMPLE = { debyeTemperatureK: 250, gammaMJPerMolK2: 2 }
const UNKNOWN_MASS_MG = 50

/** A planned run with everything it was computed from. */
export interface PlannedRun {
  facility: Facility
  cryostat: typeof cryostats.$inferSelect
  group: typeof groups.$inferSelect
  samples: (typeof samples.$inferSelect)[]
  rateCard: typeof rateCards.$inferSelect
  estimate: RunEstimate
  quote: Quote
}

/**
 * Computes hours, litres and price of a run from the sample, the temperature range and the cryostat's own past.
 *
 * @param db database or transaction
 * @param input the plan, who asks, and the instant
 * @throws DomainError naming the field that cannot be
 */
export async function estimatePlan(db: Database, input: { plan: Omit<PlanEstimateInput, 'startsAt'>, actor: Actor, now: Date }): Promise<PlannedRun> {
  const { plan, actor, now } = input
  authorise(actor, 'run:ask', { groupId: plan.groupId })
  const [[cryostat], [group], sampleRows, facility, cards] = [
    await db.select().from(cryostats).where(eq(cryostats.id, plan.cryostatId)),
    await db.select().from(groups).where(eq(groups.id, plan.groupId)),
    await db.select().from(samples).where(and(inArray(samples.id, plan.sampleIds), eq(samples.groupId, plan.groupId))),
    await readFacility(db),
    await db.select().from(rateCards).where(sql`${rateCards.issuedAt} is not null`),
  ]
  if (!cryostat || cryostat.retiredAt) throw new DomainError('invalid', 'There is no such cryostat. Choose one from the list.', ['cryostatId'])
  if (!group) throw new DomainError('invalid', 'There is no such group. Choose one of yours.', ['groupId'])
  if (sampleRows.length !== new Set(plan.sampleIds).size) throw new DomainError('invalid', 'One of the samples is not of this group. Choose samples of the group that pays.', ['sampleIds'])
  const rateCard = cardInForce(cards, wallTimeOf(now, facility.timeZone).date)
  const [prices] = await db.select().from(rateCardPrices).where(and(eq(rateCardPrices.rateCardId, rateCard.id), eq(rateCardPrices.groupClass, group.class)))
  if (!prices) throw new DomainError('conflict', `The rate card “${rateCard.name}” has no prices for ${group.class} groups. Ask the facility's manager.`)

  const estimate = estimateRun({
    cryostat: cryostatPlanningFacts(cryostat),
    // Several samples are measured one after another; the slowest decides the time of a point.
    sample: slowestSample(sampleRows),
    temperatureRangeK: [plan.temperatureLowK, plan.temperatureHighK],
    points: plan.points * sampleRows.length,
    nitrogenPrecool: plan.nitrogenPrecool && cryostat.nitrogenPrecool,
    sweeps: plan.sweeps,
  }, await readFinishedRuns(db, cryostat))
  const quote = quoteRun(estimate, {
    prices, groupClass: group.class, reverseCharge: group.reverseCharge, depositPercent: rateCard.depositPercent, sampleCount: sampleRows.length, recoveryFraction: cryostat.recoveryFraction,
  })
  return { facility, cryostat, group, samples: sampleRows, rateCard, estimate, quote }
}

function slowestSample(rows: readonly (typeof samples.$inferSelect)[]): PlannedSample {
  const at4K = (sample: PlannedSample) => sample.amountMol * sample.heatCapacityJPerMolK(4)
  return rows.map(toPlannedSample).reduce((slowest, sample) => at4K(sample) > at4K(slowest) ? sample : slowest)
}

function toPlannedSample(row: typeof samples.$inferSelect): PlannedSample {
  const known = handbookEntry(row.formula)
  const debyeTemperatureK = known?.debyeTemperatureK ?? UNKNOWN_SAMPLE.debyeTemperatureK
  const gammaMJPerMolK2 = row.kind === 'insulator' ? 0 : known?.gamma ?? UNKNOWN_SAMPLE.gammaMJPerMolK2
  return {
    label: row.name,
    amountMol: (row.massMg ?? UNKNOWN_MASS_MG) / 1000 / row.molarMassGPerMol,
    heatCapacityJPerMolK: expectedHeatCapacity({ gammaJPerMolK2: gammaMJPerMolK2 / 1000, debyeTemperatureK, atomsPerFormulaUnit: row.atomsPerFormulaUnit }),
  }
}
