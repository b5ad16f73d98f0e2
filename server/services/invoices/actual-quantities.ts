import { runHeliumUse } from '#shared/helium/run-use'
import type { ChargeQuantities } from '#shared/pricing/lines'
import { plannedQuantities } from '#shared/pricing/quote'
import { heliumLitresFromMg, MS_PER_HOUR } from '#shared/units/helium-units'
import type { cryostats, runEntries, runs } from '#server/db/schema'
import { toHeliumLog } from '#server/services/run-log/helium-log'

/** What of a run's log is charged. */
export interface ActualFacts {
  run: typeof runs.$inferSelect
  entries: readonly (typeof runEntries.$inferSelect)[]
  cryostat: typeof cryostats.$inferSelect
  returnedMg: number
  sampleCount: number
  /** End of the run, or now while it runs. */
  until: Date
}

/**
 * Quantities as logged: never those of the plan. Helium is what was drawn for the run less what is left in the cryostat;
 * time counts from the start to the finish.
 *
 * @param facts the run, its sheet and what came back to recovery
 */
export function actualQuantities({ run, entries, cryostat, returnedMg, sampleCount, until }: ActualFacts): ChargeQuantities {
  const startedAt = run.startedAt ?? run.slot.startsAt
  const use = cryostat.usesLiquid
    ? runHeliumUse(toHeliumLog(entries, until, returnedMg), { staticBoilOffLitresPerHour: cryostat.staticBoilOffLitresPerHour, transferLossShare: cryostat.transferLossFraction })
    : null
  return {
    cooldowns: 1,
    cryostatDays: Math.max(0, until.getTime() - startedAt.getTime()) / MS_PER_HOUR / 24,
    heliumLitres: use ? Math.max(0, heliumLitresFromMg(use.usedMg + use.transferLossMg)) : 0,
    recoveredLitres: heliumLitresFromMg(returnedMg),
    // Until an operator enters the hours at the end, the planned ones stand for them.
    operatorHours: run.operatorHours ?? plannedQuantities(run.estimate, { sampleCount, recoveryFraction: 0 }, 'likely').operatorHours,
    mountings: sampleCount,
  }
}
