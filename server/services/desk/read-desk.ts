import { asc, eq, inArray, isNull } from 'drizzle-orm'
import { forecastSentence } from '#shared/helium/forecast-sentence'
import { forecastStock, type ForecastRun, type HeliumForecast } from '#shared/helium/forecast'
import { forecastRun } from '#shared/planning/forecast-run'
import { HOLDING_STATES } from '#shared/runs/states'
import { overlaps } from '#shared/runs/slot'
import type { Desk, DeskRequest } from '#shared/types/desk'
import { heliumLitresFromMg } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { cryostats, groups, heliumDeliveries, runs } from '#server/db/schema'
import { readFacility } from '#server/services/facility/queries'
import { readHeliumBalances } from '#server/services/helium/account-queries'
import { findSlotConflicts } from '#server/services/runs/ask-for-run'
import { listRunsInStates } from '#server/services/runs/queries'

const FORECAST_DAYS = 60
/** Dewars are read by weight or dipstick, to about this (common practice, no source). */
const STOCK_SD_LITRES = 5
const DEWAR_BOIL_OFF_LITRES_PER_HOUR = 0.1

interface OpenRun { run: typeof runs.$inferSelect, usesLiquid: boolean, groupClass: string }

/**
 * Everything the manager decides on, with what each request costs in helium and what it collides with.
 *
 * @param db database
 * @param now the instant
 */
export async function readDesk(db: Database, now: Date): Promise<Desk> {
  const facility = await readFacility(db)
  const [open, deliveries, balances] = [
    await db.select({ run: runs, usesLiquid: cryostats.usesLiquid, groupClass: groups.class }).from(runs).innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).innerJoin(groups, eq(groups.id, runs.groupId))
      .where(inArray(runs.state, ['asked', ...HOLDING_STATES])),
    await db.select().from(heliumDeliveries).where(isNull(heliumDeliveries.receivedAt)).orderBy(asc(heliumDeliveries.dueAt)),
    await readHeliumBalances(db),
  ]
  const stockLitres = balances.filter(account => account.kind === 'dewar').reduce((sum, account) => sum + heliumLitresFromMg(account.balanceMg), 0)
  const forecast = (planned: OpenRun[]): HeliumForecast => forecastStock({
    nowMs: now.getTime(), untilMs: now.getTime() + FORECAST_DAYS * 86_400_000, stockLitres: Math.max(0, stockLitres), stockSdLitres: STOCK_SD_LITRES, reserveLitres: facility.reserveLitres,
    dewarBoilOffLitresPerHour: DEWAR_BOIL_OFF_LITRES_PER_HOUR, mode: 'all-asked',
    runs: planned.map(toForecastRun), deliveries: deliveries.map(delivery => ({ atMs: Math.max(now.getTime(), delivery.dueAt.getTime()), litres: delivery.litres })),
  })
  const held = open.filter(({ run }) => run.state !== 'asked')
  const asked = open.filter(({ run }) => run.state === 'asked')
  const items = await listRunsInStates(db, ['asked', 'approved', 'running', 'finished'])
  const requests: DeskRequest[] = []
  for (const item of items.filter(({ state }) => state === 'asked')) {
    const request = asked.find(({ run }) => run.id === item.id)
    if (request) requests.push(await toRequest(db, item, request, asked, forecast([...held, request])))
  }
  const heldForecast = forecast(held)
  return {
    timeZone: facility.timeZone, currency: facility.currency, reserveLitres: facility.reserveLitres, stockLitres,
    requests,
    waitingForDeposit: items.filter(({ state }) => state === 'approved'),
    running: items.filter(({ state }) => state === 'running'),
    toSettle: items.filter(({ state }) => state === 'finished'),
    shortage: heldForecast.likelyShortMs === undefined && heldForecast.lowShortMs === undefined ? null : forecastSentence(heldForecast, facility.reserveLitres, facility.timeZone),
    nextDelivery: deliveries[0] ? { dueAt: deliveries[0].dueAt.toISOString(), litres: deliveries[0].litres } : null,
  }
}

function toForecastRun({ run }: OpenRun): ForecastRun {
  return forecastRun({ runId: run.id, held: run.state !== 'asked', startMs: (run.startedAt ?? run.slot.startsAt).getTime(), estimate: run.estimate })
}

async function toRequest(db: Database, item: Desk['running'][number], request: OpenRun, asked: OpenRun[], forecast: HeliumForecast): Promise<DeskRequest> {
  const { run } = request
  const rivals = asked.filter(other => other.run.id !== run.id && other.run.cryostatId === run.cryostatId && overlaps(other.run.slot, run.slot))
  const after = forecast.points.find(point => point.atMs >= run.slot.endsAt.getTime())
  return {
    ...item,
    groupClass: request.groupClass,
    heliumLitres: { ...run.estimate.totalHeliumLitres },
    totalMinor: { ...run.quote.totalMinor },
    hours: run.estimate.totalHours.likely,
    conflicts: (await findSlotConflicts(db, run.cryostatId, run.slot)).map(({ kind, label }) => ({ kind, label })),
    competing: rivals.map(rival => rival.run.number),
    stockAfter: request.usesLiquid && after ? { likely: after.likelyLitres, low: after.lowLitres } : null,
  }
}
