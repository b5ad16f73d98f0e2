import { and, desc, eq, inArray } from 'drizzle-orm'
import { type Actor, can } from '#shared/access/rules'
import { oxygenAfterRelease } from '#shared/helium/oxygen'
import { vesselCapacityLitres } from '#shared/helium/vessel'
import { cryostatPlanningFacts } from '#shared/planning/cryostat-facts'
import { learnGasUseShare, learnPhaseHours } from '#shared/planning/learning'
import { PHASE_IDS } from '#shared/planning/types'
import { PHASE_WORDS } from '#shared/runs/phases'
import { DomainError } from '#shared/errors'
import type { CryostatSheet } from '#shared/types/facility'
import type { Database } from '#server/db/client'
import { cryostats, runs } from '#server/db/schema'
import { readFacility } from '#server/services/facility/queries'
import { readFinishedRuns } from '#server/services/plan/history'
import { readUsualBoilOff } from '#server/services/run-log/history'

/**
 * A cryostat's facts and what its finished runs have taught planning.
 *
 * @param db database
 * @param slug name in its address
 * @param actor who asks; titles of other groups' runs are left out for people without a facility role
 * @throws DomainError when there is no such cryostat
 */
export async function readCryostat(db: Database, slug: string, actor: Actor): Promise<CryostatSheet> {
  const [cryostat] = await db.select().from(cryostats).where(eq(cryostats.slug, slug))
  if (!cryostat) throw new DomainError('not-found', 'There is no such cryostat.')
  const facts = cryostatPlanningFacts(cryostat)
  const history = await readFinishedRuns(db, cryostat)
  const { timeZone } = await readFacility(db)
  const vesselLitres = cryostat.usesLiquid ? vesselCapacityLitres(cryostat.vesselCalibration) : 0
  const release = cryostat.usesLiquid ? oxygenAfterRelease({ roomM3: cryostat.roomVolumeM3, liquidL: vesselLitres, fluid: 'helium' }) : null
  const share = learnGasUseShare(facts, history)
  const recent = await db.select({ id: runs.id, number: runs.number, title: runs.title, slot: runs.slot, groupId: runs.groupId }).from(runs)
    .where(and(eq(runs.cryostatId, cryostat.id), inArray(runs.state, ['finished', 'settled']))).orderBy(desc(runs.finishedAt)).limit(8)
  return {
    name: cryostat.name, slug, kind: cryostat.kind, baseTemperatureK: cryostat.baseTemperatureK, maximumFieldT: cryostat.maximumFieldT, usesLiquid: cryostat.usesLiquid, vesselLitres,
    roomVolumeM3: cryostat.roomVolumeM3, coldMass: cryostat.coldMass, usualBoilOff: await readUsualBoilOff(db, cryostat.id) ?? null,
    gasUseShare: { mean: share.mean, sd: share.sd }, finishedRuns: history.length,
    phases: PHASE_IDS.flatMap(phase => phase === 'measure' || (phase === 'cool-to-77' && !cryostat.nitrogenPrecool) ? [] : [{ phase: PHASE_WORDS[phase], ...learnPhaseHours(facts, history, phase, cryostat.nitrogenPrecool) }]).map(({ phase, mean, sd }) => ({ phase, mean, sd })),
    oxygen: release ? { percent: release.oxygenPercent, sentence: release.text } : null,
    recent: recent.map(run => ({ id: run.id, number: run.number, title: can(actor, 'run:read', { groupId: run.groupId }) ? run.title : 'a run of another group', startsAt: run.slot.startsAt.toISOString() })),
    timeZone,
  }
}
