import { and, desc, eq, inArray } from 'drizzle-orm'
import type { FinishedRunFacts, PhaseId } from '#shared/planning/types'
import { heliumMgFromLitres, heliumLitresFromMg, MS_PER_HOUR } from '#shared/units/helium-units'
import { runHeliumUse } from '#shared/helium/run-use'
import { median } from '#shared/helium/boil-off'
import type { Database } from '#server/db/client'
import type { cryostats } from '#server/db/schema'
import { runEntries, runs } from '#server/db/schema'
import { toHeliumLog } from '#server/services/run-log/helium-log'

/** Runs further back than this teach no more than those before them. */
const MOST_RUNS = 40

/**
 * What the finished runs of a cryostat teach planning: true hours of each phase, cooldown litres and static boil-off.
 * Runs that were cut short are left out.
 *
 * @param db database
 * @param cryostat the cryostat's row
 */
export async function readFinishedRuns(db: Database, cryostat: typeof cryostats.$inferSelect): Promise<FinishedRunFacts[]> {
  const finished = await db.select().from(runs)
    .where(and(eq(runs.cryostatId, cryostat.id), inArray(runs.state, ['finished', 'settled']), eq(runs.cutShort, false)))
    .orderBy(desc(runs.finishedAt)).limit(MOST_RUNS)
  if (finished.length === 0) return []
  const entries = await db.select().from(runEntries).where(inArray(runEntries.runId, finished.map(run => run.id))).orderBy(runEntries.at)
  return finished.map((run): FinishedRunFacts => {
    const sheet = entries.filter(entry => entry.runId === run.id)
    const use = cryostat.usesLiquid ? runHeliumUse(toHeliumLog(sheet, run.finishedAt ?? run.slot.endsAt), cryostat.transferLossFraction === 0 ? zeroFacts : { staticBoilOffLitresPerHour: cryostat.staticBoilOffLitresPerHour, transferLossShare: cryostat.transferLossFraction }) : null
    const rates = sheet.flatMap(entry => entry.boilOffLitresPerHour ?? [])
    return {
      runId: run.id,
      cryostatId: cryostat.id,
      nitrogenPrecool: run.planInput.nitrogenPrecool,
      startTemperatureK: run.planInput.nitrogenPrecool ? 77 : 300,
      ...(use && use.cooldownMg > heliumMgFromLitres(0.5) ? { cooldownLitres: heliumLitresFromMg(use.cooldownMg) } : {}),
      ...(rates.length > 0 ? { staticBoilOffLitresPerHour: median(rates) } : {}),
      phaseHours: phaseHours(sheet, run.finishedAt),
      plannedMeasureHours: run.estimate.phases.find(({ phase }) => phase === 'measure')?.hours.likely,
    }
  })
}

const zeroFacts = { staticBoilOffLitresPerHour: 0, transferLossShare: 0 }

/** True hours of each phase, from its first line to that of the next (or the end of the run). */
function phaseHours(sheet: (typeof runEntries.$inferSelect)[], finishedAt: Date | null): Partial<Record<PhaseId, number>> {
  const starts = sheet.filter(entry => entry.kind === 'phase' && entry.phase)
  const hours: Partial<Record<PhaseId, number>> = {}
  starts.forEach((entry, index) => {
    const end = starts[index + 1]?.at ?? finishedAt
    if (entry.phase && end) hours[entry.phase] = (hours[entry.phase] ?? 0) + (end.getTime() - entry.at.getTime()) / MS_PER_HOUR
  })
  return hours
}
