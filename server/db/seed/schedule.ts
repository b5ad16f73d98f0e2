import type { CryostatKind } from '#shared/planning/types'
import type { Random } from './random'
import type { SeededSample } from './samples'

const DAY_MS = 86_400_000

/** What a run of the seed is to be. */
export interface RunSpec {
  cryostat: string
  sample: SeededSample
  startsAt: Date
  temperatureLowK: number
  temperatureHighK: number
  points: number
  cutShort: boolean
}

/** How each kind of cryostat is used: temperatures, points, and idle days between runs. */
const USE: Record<CryostatKind, { lowK: number, highK: number, points: [number, number], idleDays: [number, number], days: number, samples: string[] }> = {
  'bath-he4': { lowK: 1.6, highK: 12, points: [36, 70], idleDays: [1, 6], days: 3.5, samples: ['cu', 'ag', 'alloy', 'oxide', 'au', 'pd', 'heavy'] },
  'he3-insert': { lowK: 0.35, highK: 8, points: [40, 80], idleDays: [2, 9], days: 4.5, samples: ['heavy', 'au', 'pd', 'cu'] },
  'dilution': { lowK: 0.05, highK: 4, points: [40, 60], idleDays: [5, 16], days: 8, samples: ['heavy', 'pd', 'au'] },
  'closed-cycle': { lowK: 3.5, highK: 60, points: [40, 80], idleDays: [1, 5], days: 2.5, samples: ['sapphire', 'si', 'alloy', 'ag', 'cu'] },
}

/** How a cryostat of this kind is used. */
export function useOf(kind: CryostatKind) {
  return USE[kind]
}

/**
 * Two years of runs of one cryostat, oldest first, the last ending some days before `until`.
 *
 * @param cryostat slug and kind
 * @param samples sheets to choose from
 * @param random number source
 * @param until no run is to reach this instant
 */
export function pastRuns(cryostat: { slug: string, kind: CryostatKind }, samples: SeededSample[], random: Random, until: Date): RunSpec[] {
  const use = USE[cryostat.kind]
  const specs: RunSpec[] = []
  let at = new Date(until.getTime() - 730 * DAY_MS)
  at.setUTCHours(7, 0, 0, 0)
  while (at.getTime() + use.days * 1.6 * DAY_MS < until.getTime()) {
    // Every fourth run or so is the copper standard, where the cryostat reaches its range.
    const key = use.samples.includes('cu') && random.chance(0.16) ? 'cu' : random.pick(use.samples.filter(name => name !== 'cu'))
    specs.push({
      cryostat: cryostat.slug, sample: samples.find(sample => sample.key === key)!, startsAt: at,
      temperatureLowK: use.lowK, temperatureHighK: use.highK, points: random.integer(...use.points), cutShort: random.chance(0.04),
    })
    at = new Date(at.getTime() + Math.ceil(use.days * 1.5 + random.between(...use.idleDays)) * DAY_MS)
  }
  return specs
}
