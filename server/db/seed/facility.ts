import type { InferInsertModel } from 'drizzle-orm'
import type { Database } from '#server/db/client'
import { cryostats, facilities, heliumAccounts } from '#server/db/schema'

type Cryostat = InferInsertModel<typeof cryostats>

const FACILITY: InferInsertModel<typeof facilities> = {
  name: 'Skerry Low-Temperature Facility',
  timeZone: 'Europe/Oslo',
  currency: 'EUR',
  addressLines: ['Quay House 3', '5003 Skerry'],
  email: 'desk@skerry.example',
  vatId: 'NO 999 000 111 MVA',
  bankAccount: 'NO00 0000 0000 000',
  reserveLitres: 80,
  payByHours: 72,
  quoteLockDays: 14,
  paymentTermDays: 30,
  refundLadder: [{ fromDaysBefore: 14, refundPercent: 100 }, { fromDaysBefore: 3, refundPercent: 50 }, { fromDaysBefore: 0, refundPercent: 0 }],
}

const hours = (mean: number, standardDeviation: number) => ({ mean, standardDeviation })

/** Four cryostats, as unlike as a facility's are; invented. */
const CRYOSTATS: Cryostat[] = [
  {
    slug: 'petrel', name: 'Petrel', kind: 'bath-he4', position: 1, baseTemperatureK: 1.5, maximumFieldT: 9, usesLiquid: true, nitrogenPrecool: true,
    vesselCalibration: [{ percent: 0, litres: 0 }, { percent: 10, litres: 4.1 }, { percent: 50, litres: 24 }, { percent: 100, litres: 50 }],
    coldMass: [{ material: 'copper', massKg: 6 }, { material: 'stainless-steel', massKg: 9 }, { material: 'aluminium', massKg: 3 }],
    staticBoilOffLitresPerHour: 0.32, transferLossFraction: 0.15, recoveryFraction: 0.86, gasUsePrior: hours(0.45, 0.15),
    phaseHoursPrior: { 'prepare': hours(5, 1.5), 'cool-to-77': hours(10, 2.5), 'cool-to-base': hours(6, 2), 'warm-up': hours(16, 4), 'turn-round': hours(3, 1) },
    linkConductanceWPerK: 4e-7, roomVolumeM3: 140,
  },
  {
    slug: 'fulmar', name: 'Fulmar', kind: 'he3-insert', position: 2, baseTemperatureK: 0.3, maximumFieldT: 14, usesLiquid: true, nitrogenPrecool: true,
    vesselCalibration: [{ percent: 0, litres: 0 }, { percent: 20, litres: 13 }, { percent: 100, litres: 72 }],
    coldMass: [{ material: 'copper', massKg: 11 }, { material: 'stainless-steel', massKg: 12 }, { material: 'aluminium', massKg: 4 }],
    staticBoilOffLitresPerHour: 0.42, transferLossFraction: 0.17, recoveryFraction: 0.84, gasUsePrior: hours(0.45, 0.15),
    phaseHoursPrior: { 'prepare': hours(6, 2), 'cool-to-77': hours(14, 3), 'cool-to-base': hours(12, 3), 'warm-up': hours(20, 5), 'turn-round': hours(4, 1.5) },
    linkConductanceWPerK: 3e-7, roomVolumeM3: 140,
  },
  {
    slug: 'gannet', name: 'Gannet', kind: 'dilution', position: 3, baseTemperatureK: 0.02, maximumFieldT: 16, usesLiquid: true, nitrogenPrecool: true,
    vesselCalibration: [{ percent: 0, litres: 0 }, { percent: 15, litres: 12 }, { percent: 100, litres: 95 }],
    coldMass: [{ material: 'copper', massKg: 22 }, { material: 'stainless-steel', massKg: 16 }, { material: 'aluminium', massKg: 6 }],
    staticBoilOffLitresPerHour: 0.55, transferLossFraction: 0.18, recoveryFraction: 0.88, gasUsePrior: hours(0.4, 0.15),
    phaseHoursPrior: { 'prepare': hours(10, 3), 'cool-to-77': hours(24, 5), 'cool-to-base': hours(30, 6), 'warm-up': hours(36, 8), 'turn-round': hours(6, 2) },
    linkConductanceWPerK: 2e-7, roomVolumeM3: 220,
  },
  {
    slug: 'puffin', name: 'Puffin', kind: 'closed-cycle', position: 4, baseTemperatureK: 3.1, maximumFieldT: 0, usesLiquid: false, nitrogenPrecool: false,
    vesselCalibration: [], coldMass: [{ material: 'copper', massKg: 7 }, { material: 'aluminium', massKg: 5 }],
    staticBoilOffLitresPerHour: 0, transferLossFraction: 0, recoveryFraction: 0, gasUsePrior: hours(0.5, 0.2),
    phaseHoursPrior: { 'prepare': hours(3, 1), 'cool-to-base': hours(14, 3), 'warm-up': hours(12, 3), 'turn-round': hours(2, 0.7) },
    linkConductanceWPerK: 6e-7, roomVolumeM3: 110,
  },
]

/** Ids that the rest of the seed builds on. */
export interface SeededFacility {
  facility: typeof facilities.$inferSelect
  cryostats: (typeof cryostats.$inferSelect)[]
  accounts: { supplier: string, recovery: string, lost: string, dewars: string[], cryostat: Map<string, string> }
}

/** The facility, its cryostats and the accounts between which helium moves. */
export async function seedFacility(db: Database): Promise<SeededFacility> {
  const [facility] = await db.insert(facilities).values(FACILITY).returning()
  const rows = await db.insert(cryostats).values(CRYOSTATS).returning()
  const accounts = await db.insert(heliumAccounts).values([
    { kind: 'supplier' as const, name: 'Supplier' },
    { kind: 'recovery' as const, name: 'Recovery' },
    { kind: 'lost' as const, name: 'Lost' },
    { kind: 'dewar' as const, name: 'Dewar D-07', capacityLitres: 250 },
    { kind: 'dewar' as const, name: 'Dewar D-11', capacityLitres: 250 },
    ...rows.filter(row => row.usesLiquid).map(row => ({ kind: 'cryostat' as const, name: row.name, cryostatId: row.id })),
  ]).returning()
  const one = (kind: string) => accounts.find(account => account.kind === kind)!.id
  return {
    facility: facility!,
    cryostats: rows,
    accounts: {
      supplier: one('supplier'), recovery: one('recovery'), lost: one('lost'),
      dewars: accounts.filter(account => account.kind === 'dewar').map(account => account.id),
      cryostat: new Map(accounts.flatMap(account => account.cryostatId ? [[account.cryostatId, account.id] as const] : [])),
    },
  }
}
