import { TZDate, tzOffset } from '@date-fns/tz'
import { addDays as addCalendarDays, differenceInCalendarDays, formatISO, startOfISOWeek } from 'date-fns'
import { DomainError } from '#shared/errors'

/** A wall-clock day and time as read off a facility's clock. */
export interface WallTime {
  /** `YYYY-MM-DD` */
  readonly date: string
  /** `HH:MM` */
  readonly time: string
}

const MS_PER_MINUTE = 60_000
const pad = (value: number) => String(value).padStart(2, '0')

/** Wall-clock day and time of an instant in a zone. */
export function wallTimeOf(instant: Date, timeZone: string): WallTime {
  const local = new TZDate(instant.getTime(), timeZone)
  return { date: `${local.getFullYear()}-${pad(local.getMonth() + 1)}-${pad(local.getDate())}`, time: `${pad(local.getHours())}:${pad(local.getMinutes())}` }
}

/**
 * The instants that a facility's clock reads as a wall-clock time, earliest first.
 *
 * @param wall day and time as typed
 * @param timeZone IANA zone
 * @returns one; two where the clock is put back over this time; none where it is put forward over it
 * @throws DomainError for what is no day and time
 */
export function instantsOfWallTime(wall: WallTime, timeZone: string): Date[] {
  const naive = Date.parse(`${wall.date}T${wall.time}:00Z`)
  // Date.parse rolls 30 February over into March, and 24:00 into the next day.
  if (Number.isNaN(naive) || new Date(naive).toISOString().slice(0, 16) !== `${wall.date}T${wall.time}`) throw new DomainError('invalid', 'This is not a date and time. Enter a date such as 2027-05-04 and a time such as 09:30.', ['time'])
  // The offset on either side of any change near this time; a valid instant is one whose own offset leads back to it.
  const candidates = offsetsAround(naive, timeZone).map(offset => naive - offset)
    .filter(instant => naive - offsetMs(instant, timeZone) === instant)
  return [...new Set(candidates)].sort((a, b) => a - b).map(instant => new Date(instant))
}

/**
 * The instant of a wall-clock time.
 *
 * @param wall day and time as typed
 * @param timeZone IANA zone
 * @param fold which of the two, where the clock is put back over this time
 * @throws DomainError when the clock is put forward over this time, naming the next one that exists
 */
export function instantOfWallTime(wall: WallTime, timeZone: string, fold: 'first' | 'second' = 'first'): Date {
  const instants = instantsOfWallTime(wall, timeZone)
  const chosen = fold === 'first' ? instants[0] : instants.at(-1)
  if (chosen) return chosen
  const next = wallTimeOf(firstInstantAfterGap(Date.parse(`${wall.date}T${wall.time}:00Z`), timeZone), timeZone)
  const nextText = next.date === wall.date ? next.time : `${next.date}, ${next.time}`
  throw new DomainError('invalid', `On ${wall.date} the clock is put forward over ${wall.time}, so this time does not exist. The next one that does is ${nextText}.`, ['time'])
}

const offsetMs = (instantMs: number, timeZone: string) => tzOffset(timeZone, new Date(instantMs)) * MS_PER_MINUTE
const offsetsAround = (naive: number, timeZone: string) => [-24, 24].map(hours => offsetMs(naive + hours * 60 * MS_PER_MINUTE, timeZone)) as [number, number]

/** The instant at which the clock is put forward over a wall time, by bisection to the minute. */
function firstInstantAfterGap(naive: number, timeZone: string): Date {
  const [offsetBefore, offsetAfter] = offsetsAround(naive, timeZone)
  let before = naive - offsetAfter
  let after = naive - offsetBefore
  while (after - before > MS_PER_MINUTE) {
    const middle = before + Math.ceil((after - before) / 2 / MS_PER_MINUTE) * MS_PER_MINUTE
    if (offsetMs(middle, timeZone) === offsetBefore) before = middle
    else after = middle
  }
  return new Date(after)
}

/** The instant at which a day starts in a zone, also where the clock is changed at midnight. */
export function startOfDay(date: string, timeZone: string): Date {
  for (const time of ['00:00', '00:30', '01:00']) {
    try {
      return instantOfWallTime({ date, time }, timeZone)
    }
    catch (error) {
      if (!(error instanceof DomainError) || time === '01:00') throw error
    }
  }
  throw new DomainError('invalid', 'This is not a date. Enter a date such as 2027-05-04.', ['date'])
}

// Calendar days are counted at noon in UTC, where no clock changes.
const noonOf = (date: string) => new TZDate(`${date}T12:00:00Z`, 'UTC')
const dayOf = (instant: Date) => formatISO(instant, { representation: 'date' })

/** The day so many days later (or earlier), as a calendar counts. */
export function addDays(date: string, days: number): string {
  return dayOf(addCalendarDays(noonOf(date), days))
}

/** Monday of the week of a day (ISO 8601 weeks). */
export function mondayOf(date: string): string {
  return dayOf(startOfISOWeek(noonOf(date)))
}

/** Whole days from one day to another. */
export function daysBetween(from: string, to: string): number {
  return differenceInCalendarDays(noonOf(to), noonOf(from))
}
