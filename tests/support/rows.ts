import type { RunEstimate } from '#shared/planning/types'
import type { GroupClass } from '#shared/pricing/rate-card'
import type { RunState } from '#shared/runs/states'
import type { Database } from '#server/db/client'
import { cryostats, groupMemberships, groups, people, rateCardPrices, rateCards, runs } from '#server/db/schema'

/** Ids of a small facility that tests build on. */
export interface TestFacility { personId: string, groupId: string, cryostatId: string, rateCardId: string }

const litres = (likely: number) => ({ low: likely * 0.8, likely, high: likely * 1.2 })

/** 48 h and 60 L: four hours of preparation, twenty of cooling, sixteen of measuring, eight to warm up and turn round. */
const testEstimate: RunEstimate = {
  phases: ([['prepare', 4, 0], ['cool-to-77', 12, 0], ['cool-to-base', 8, 40], ['measure', 16, 20], ['warm-up', 6, 0], ['turn-round', 2, 0]] as const)
    .map(([phase, hours, drawnLitres]) => ({ phase, hours: litres(hours), hoursSd: hours * 0.15, drawnLitres, drawnSdLitres: drawnLitres * 0.15 })),
  totalHours: litres(48),
  heliumLitres: { cooldown: litres(20), fill: litres(20), transferLoss: litres(10), staticBoilOff: litres(7), measurement: litres(3) },
  totalHeliumLitres: litres(60),
  totalHeliumSdLitres: 9,
  gasUseShare: { mean: 0.5, sd: 0.1 },
  finishedRunCount: 0,
  basis: [],
}

let serial = 0

/** A person, a group, a cryostat and an issued rate card: the least that a run needs. */
export async function insertTestFacility(db: Database, groupClass: GroupClass = 'academic'): Promise<TestFacility> {
  serial += 1
  const [person] = await db.insert(people).values({ email: `person${serial}@skerry.example`, name: `Person ${serial}`, passwordHash: 'none' }).returning()
  const [group] = await db.insert(groups).values({ name: `Group ${serial}`, class: groupClass, institution: 'Skerry University', addressLines: ['1 Quay'], invoiceEmail: `group${serial}@skerry.example` }).returning()
  await db.insert(groupMemberships).values({ groupId: group!.id, personId: person!.id, role: 'pi' })
  const [cryostat] = await db.insert(cryostats).values({
    slug: `cryostat-${serial}`, name: `Cryostat ${serial}`, kind: 'bath-he4', position: serial, baseTemperatureK: 1.5, usesLiquid: true, nitrogenPrecool: true,
    vesselCalibration: [{ percent: 0, litres: 0 }, { percent: 100, litres: 60 }], coldMass: [{ material: 'copper', massKg: 8 }],
    staticBoilOffLitresPerHour: 0.4, transferLossFraction: 0.15, recoveryFraction: 0.85, gasUsePrior: { mean: 0.5, standardDeviation: 0.15 },
    phaseHoursPrior: {}, linkConductanceWPerK: 1e-7, roomVolumeM3: 120,
  }).returning()
  const [card] = await db.insert(rateCards).values({ name: `Card ${serial}`, validFrom: '2026-01-01', currency: 'EUR', depositPercent: 30 }).returning()
  await db.insert(rateCardPrices).values({ rateCardId: card!.id, groupClass, perCooldownMinor: 40000, perDayMinor: 20000, perLitreMinor: 900, recoveryCreditPerLitreMinor: 300, perOperatorHourMinor: 6000, perMountingMinor: 5000, minimumMinor: 10000, vatBasisPoints: 2500 })
  return { personId: person!.id, groupId: group!.id, cryostatId: cryostat!.id, rateCardId: card!.id }
}

/** A run of the facility in a given state and slot (ISO instants). */
export async function insertTestRun(db: Database, facility: TestFacility, state: RunState, startsAt: string, endsAt: string) {
  const [run] = await db.insert(runs).values({
    title: 'Copper', cryostatId: facility.cryostatId, groupId: facility.groupId, requestedBy: facility.personId, state,
    slot: { startsAt: new Date(startsAt), endsAt: new Date(endsAt) },
    planInput: { temperatureLowK: 2, temperatureHighK: 10, points: 40, nitrogenPrecool: true, sweeps: 0 },
    estimate: testEstimate,
    quote: { lines: [], netMinor: 100_000, vatMinor: 25_000, totalMinor: { low: 100_000, likely: 125_000, high: 150_000 }, vatBasisPoints: 2500, reverseCharge: false, depositMinor: 37_500, lockedUntil: '2027-01-01T00:00:00Z' },
    rateCardId: facility.rateCardId,
  }).returning()
  return run!
}
