import { eq } from 'drizzle-orm'
import type { RunState } from '#shared/runs/states'
import type { Database } from '#server/db/client'
import { closures, cryostatHolds } from '#server/db/schema'
import type { SeededFacility } from './facility'
import type { SeededSample } from './samples'
import { type RunSpec, useOf } from './schedule'

const DAY_MS = 86_400_000
const HOUR_MS = 3_600_000

/** The living present: running, confirmed, waiting, competing, asked. Days from today and hour of the day (UTC). */
const PRESENT: { cryostat: string, sample: string, days: number, hour: number, state: RunState, points?: number }[] = [
  { cryostat: 'petrel', sample: 'ag', days: -1, hour: 8, state: 'running', points: 60 },
  { cryostat: 'petrel', sample: 'cu', days: 4, hour: 7, state: 'confirmed' },
  { cryostat: 'petrel', sample: 'oxide', days: 10, hour: 8, state: 'asked' },
  { cryostat: 'petrel', sample: 'au', days: 11, hour: 7, state: 'asked' },
  { cryostat: 'fulmar', sample: 'pd', days: 1, hour: 7, state: 'confirmed' },
  { cryostat: 'fulmar', sample: 'heavy', days: 8, hour: 7, state: 'asked' },
  { cryostat: 'fulmar', sample: 'au', days: 9, hour: 7, state: 'asked' },
  { cryostat: 'gannet', sample: 'au', days: -4, hour: 7, state: 'running' },
  { cryostat: 'gannet', sample: 'heavy', days: 14, hour: 7, state: 'asked' },
  { cryostat: 'puffin', sample: 'sapphire', days: -1, hour: 6, state: 'running', points: 40 },
  { cryostat: 'puffin', sample: 'alloy', days: 3, hour: 7, state: 'approved' },
  { cryostat: 'puffin', sample: 'cu', days: 7, hour: 7, state: 'confirmed' },
  { cryostat: 'puffin', sample: 'si', days: 12, hour: 7, state: 'asked' },
]

/** Runs around today. */
export function presentRuns(facility: SeededFacility, samples: SeededSample[], now: Date): (RunSpec & { state: RunState })[] {
  return PRESENT.map(({ cryostat: slug, sample: key, days, hour, state, points }) => {
    const cryostat = facility.cryostats.find(candidate => candidate.slug === slug)!
    const startsAt = new Date(now.getTime() + days * DAY_MS)
    startsAt.setUTCHours(hour, 0, 0, 0)
    const use = useOf(cryostat.kind)
    return { cryostat: slug, sample: samples.find(sample => sample.key === key)!, startsAt, temperatureLowK: use.lowK, temperatureHighK: use.highK, points: points ?? use.points[0], cutShort: false, state }
  })
}

/** Closures ahead, each as soon as its cryostat is free from so many days on. */
export async function seedClosures(db: Database, facility: SeededFacility, managerId: string, now: Date) {
  const wanted = [
    { slug: 'gannet', days: 9, lasts: 3, reason: 'Pump service' },
    { slug: 'puffin', days: 20, lasts: 1, reason: 'Cold head exchange' },
  ]
  for (const { slug, days, lasts, reason } of wanted) {
    const { id } = facility.cryostats.find(cryostat => cryostat.slug === slug)!
    const holds = await db.select({ during: cryostatHolds.during }).from(cryostatHolds).where(eq(cryostatHolds.cryostatId, id))
    const startsAt = new Date(Math.max(now.getTime() + days * DAY_MS, ...holds.map(hold => hold.during.endsAt.getTime() + DAY_MS / 2)))
    startsAt.setUTCHours(startsAt.getUTCHours() > 7 ? 31 : 7, 0, 0, 0)
    await db.insert(closures).values({ cryostatId: id, during: { startsAt, endsAt: new Date(startsAt.getTime() + lasts * DAY_MS) }, reason, createdBy: managerId })
  }
}

/** Helium on order. */
export function orderedHelium(now: Date): { dueAt: Date, litres: number }[] {
  return [{ dueAt: new Date(Math.ceil(now.getTime() / DAY_MS) * DAY_MS + 5 * DAY_MS + 9 * HOUR_MS), litres: 250 }]
}
