import { wallTimeOf } from '#shared/time/facility-time'

const WEEKDAYS = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat']
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']

function partsOf(date: string) {
  const [year = 0, month = 1, day = 1] = date.split('-').map(Number)
  return { year, month: MONTHS[month - 1] ?? '', day, weekday: WEEKDAYS[new Date(`${date}T12:00:00Z`).getUTCDay()] ?? '' }
}

/** A day: `Thu 7 May`. */
export function formatDay(date: string): string {
  const { weekday, day, month } = partsOf(date)
  return `${weekday} ${day} ${month}`
}

/** A day with its year, for papers: `7 May 2027`. */
export function formatDate(date: string): string {
  const { day, month, year } = partsOf(date)
  return `${day} ${month} ${year}`
}

/** An instant in a zone: `Thu 7 May 10:05`. */
export function formatInstant(instant: Date | string, timeZone: string): string {
  const { date, time } = wallTimeOf(new Date(instant), timeZone)
  return `${formatDay(date)} ${time}`
}

/** Two days: `4 – 17 May`, `28 Apr – 11 May`, with the year where it changes; `4 May` where both are one. */
export function formatDayRange(from: string, to: string): string {
  const [start, end] = [partsOf(from), partsOf(to)]
  if (from === to) return `${end.day} ${end.month}`
  const startText = start.year !== end.year ? `${start.day} ${start.month} ${start.year}` : start.month !== end.month ? `${start.day} ${start.month}` : String(start.day)
  return `${startText} – ${end.day} ${end.month}${start.year !== end.year ? ` ${end.year}` : ''}`
}

/** A slot of a run in a zone: `Thu 7 May 10:00 – Sat 9 May 18:00`. */
export function formatSlot(startsAt: Date | string, endsAt: Date | string, timeZone: string): string {
  return `${formatInstant(startsAt, timeZone)} – ${formatInstant(endsAt, timeZone)}`
}
