import type { RunHeliumLog } from '#shared/helium/run-use'
import { heliumMgFromLitres } from '#shared/units/helium-units'
import type { runEntries } from '#server/db/schema'

type Entry = typeof runEntries.$inferSelect

/**
 * The helium log of a run sheet.
 *
 * @param sheet lines of the run in order of time
 * @param until instant up to which it is read
 * @param returnedMg gas that came back to recovery by the books, mg
 */
export function toHeliumLog(sheet: readonly Entry[], until: Date, returnedMg = 0): RunHeliumLog {
  const contents = sheet.filter(entry => entry.liquidLitres !== null && entry.at <= until)
  const first = contents[0]
  const last = contents.at(-1)
  const measureFrom = sheet.find(entry => entry.phase === 'measure')?.at
  return {
    transfers: contents.filter(entry => entry.kind === 'transfer').map(entry => ({
      startMs: (entry.startedAt ?? entry.at).getTime(),
      endMs: entry.at.getTime(),
      takenMg: heliumMgFromLitres(entry.drawnLitres ?? 0),
      beforeMg: heliumMgFromLitres(entry.beforeLitres ?? 0),
      afterMg: heliumMgFromLitres(entry.liquidLitres ?? 0),
      cooling: measureFrom === undefined || entry.at < measureFrom,
    })),
    startMg: heliumMgFromLitres(first?.kind === 'transfer' ? first.beforeLitres ?? 0 : first?.liquidLitres ?? 0),
    endMg: heliumMgFromLitres(last?.liquidLitres ?? 0),
    endMs: (last?.at ?? until).getTime(),
    returnedMg,
  }
}
