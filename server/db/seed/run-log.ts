import { randomUUID } from 'node:crypto'
import { cooldownLitres } from '#shared/planning/cooldown'
import type { PhaseId, RunEstimate } from '#shared/planning/types'
import { levelFromLitres, litresFromLevel, vesselCapacityLitres } from '#shared/helium/vessel'
import { MS_PER_HOUR } from '#shared/units/helium-units'
import type { cryostats, runEntries } from '#server/db/schema'
import type { Random } from './random'

type Cryostat = typeof cryostats.$inferSelect
type NewEntry = typeof runEntries.$inferInsert

/** Share of the gas enthalpy each kind of cryostat really uses; what planning has to learn. */
const TRUE_GAS_USE: Record<string, number> = { petrel: 0.58, fulmar: 0.52, gannet: 0.47 }
const READING_EVERY_H = 8
const REFILL_BELOW_PERCENT = 28
const FILL_PERCENT = 94

/** Who wrote the log, and into which run. */
export interface LogFacts {
  runId: string
  cryostat: Cryostat
  estimate: RunEstimate
  temperatureLowK: number
  startsAt: Date
  /** Lines after this instant have not been written yet. */
  until: Date
  operatorIds: string[]
  dewarIds: string[]
  nitrogenPrecool: boolean
}

/** Lines of an invented run sheet and when the run ended. */
export interface SeededLog { entries: NewEntry[], endsAt: Date }

/** Writes the run sheet of a run as an operator would have: phases, first fill, levels every eight hours, refills, warm-up. */
export function writeLog(facts: LogFacts, random: Random): SeededLog {
  const log = new LogWriter(facts, random)
  for (const { phase, hours } of facts.estimate.phases) log.phase(phase, Math.max(1, random.normal(hours.likely, hours.likely * 0.1)))
  return { entries: log.entries.filter(entry => entry.at <= facts.until), endsAt: new Date(log.atMs) }
}

class LogWriter {
  readonly entries: NewEntry[] = []
  atMs: number
  private litres = 0

  constructor(private readonly facts: LogFacts, private readonly random: Random) {
    this.atMs = facts.startsAt.getTime()
  }

  phase(phase: PhaseId, hours: number) {
    const startMs = this.atMs
    this.add(startMs, { kind: 'phase', phase })
    if (phase === 'prepare') this.temperature(startMs + 10 * 60_000, 293 + this.random.normal(0, 1))
    if (phase === 'cool-to-77') {
      this.temperature(startMs + hours * 0.5 * MS_PER_HOUR, 160 + this.random.normal(0, 12))
      this.temperature(startMs + (hours - 0.2) * MS_PER_HOUR, 78.5 + this.random.normal(0, 0.5))
    }
    if (phase === 'cool-to-base') this.coolToBase(startMs, hours)
    if (phase === 'measure') this.measure(startMs, hours)
    if (phase === 'warm-up') {
      if (this.facts.cryostat.usesLiquid) this.level(startMs + hours * 0.6 * MS_PER_HOUR, 0, null)
      this.temperature(startMs + (hours - 0.2) * MS_PER_HOUR, 285 + this.random.normal(0, 4))
    }
    this.atMs = startMs + hours * MS_PER_HOUR
  }

  private coolToBase(startMs: number, hours: number) {
    const { cryostat, temperatureLowK, nitrogenPrecool } = this.facts
    if (cryostat.usesLiquid) {
      const evaporated = cooldownLitres(cryostat.coldMass, nitrogenPrecool ? 77 : 300, TRUE_GAS_USE[cryostat.slug] ?? 0.5) * Math.max(0.7, this.random.normal(1, 0.07))
      const after = litresFromLevel(cryostat.vesselCalibration, FILL_PERCENT + this.random.normal(0, 1))
      this.transfer(startMs + hours * 0.25 * MS_PER_HOUR, hours * 0.4, 0, after, (after + evaporated) / (1 - cryostat.transferLossFraction))
    }
    this.temperature(startMs + hours * 0.7 * MS_PER_HOUR, 4.3 + this.random.normal(0, 0.05))
    this.temperature(startMs + (hours - 0.2) * MS_PER_HOUR, temperatureLowK * Math.max(0.9, this.random.normal(1.02, 0.02)))
  }

  private measure(startMs: number, hours: number) {
    const { cryostat, temperatureLowK } = this.facts
    const rate = cryostat.staticBoilOffLitresPerHour * Math.max(0.7, this.random.normal(1.12, 0.06))
    for (let hour = 2; hour < hours; hour += READING_EVERY_H) {
      const atMs = startMs + hour * MS_PER_HOUR
      this.temperature(atMs + 5 * 60_000, temperatureLowK * Math.max(0.98, this.random.normal(1.3, 0.15)))
      if (!cryostat.usesLiquid) continue
      const stretchRate = rate * Math.max(0.5, this.random.normal(1, 0.03))
      const elapsed = (atMs - (this.entries.findLast(entry => entry.liquidLitres !== undefined && entry.liquidLitres !== null)?.at.getTime() ?? atMs)) / MS_PER_HOUR
      const now = Math.max(0, this.litres - stretchRate * elapsed)
      this.level(atMs, now, elapsed >= 0.5 ? stretchRate : null)
      if (levelFromLitres(cryostat.vesselCalibration, now) < REFILL_BELOW_PERCENT) {
        const after = litresFromLevel(cryostat.vesselCalibration, FILL_PERCENT + this.random.normal(0, 1))
        this.transfer(atMs + 20 * 60_000, 0.6, now, after, (after - now) / (1 - cryostat.transferLossFraction * Math.max(0.6, this.random.normal(1, 0.1))))
      }
    }
  }

  private temperature(atMs: number, temperatureK: number) {
    this.add(atMs, { kind: 'temperature', temperatureK: Number(temperatureK.toPrecision(4)) })
  }

  private level(atMs: number, litres: number, boilOffLitresPerHour: number | null) {
    this.litres = litres
    this.add(atMs, { kind: 'level', liquidLitres: litres, levelPercent: Number(levelFromLitres(this.facts.cryostat.vesselCalibration, litres).toFixed(1)), boilOffLitresPerHour })
  }

  private transfer(startMs: number, hours: number, before: number, after: number, drawn: number) {
    this.litres = Math.min(after, vesselCapacityLitres(this.facts.cryostat.vesselCalibration))
    this.add(startMs + hours * MS_PER_HOUR, {
      kind: 'transfer', startedAt: new Date(startMs), fromAccountId: this.random.pick(this.facts.dewarIds), drawnLitres: drawn, beforeLitres: before, liquidLitres: this.litres,
      levelPercent: Number(levelFromLitres(this.facts.cryostat.vesselCalibration, this.litres).toFixed(1)),
    })
  }

  private add(atMs: number, values: Pick<NewEntry, 'kind'> & Partial<NewEntry>) {
    const at = new Date(atMs)
    this.entries.push({ runId: this.facts.runId, at, recordedAt: at, recordedBy: this.random.pick(this.facts.operatorIds), clientKey: randomUUID(), ...values })
  }
}
