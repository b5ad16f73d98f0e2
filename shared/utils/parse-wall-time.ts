const pad = (part: string) => part.padStart(2, '0')

/**
 * A day as a person types it: `2027-05-04`, `2027/5/4` or `4.5.2027`.
 *
 * @returns `YYYY-MM-DD`, or undefined when it is no day of the calendar
 */
export function parseDay(typed: string): string | undefined {
  const plain = typed.trim()
  const [, year, month, day] = /^(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})$/.exec(plain) ?? []
  const [, lastDay, lastMonth, lastYear] = /^(\d{1,2})\.\s?(\d{1,2})\.\s?(\d{4})$/.exec(plain) ?? []
  const parts = year && month && day ? [year, month, day] : lastYear && lastMonth && lastDay ? [lastYear, lastMonth, lastDay] : undefined
  if (!parts) return undefined
  const text = `${parts[0]}-${pad(parts[1]!)}-${pad(parts[2]!)}`
  const at = new Date(`${text}T12:00:00Z`)
  // A 31 February would roll over into March.
  return !Number.isNaN(at.getTime()) && at.toISOString().startsWith(text) ? text : undefined
}

/**
 * A time of day as a person types it: `09:30`, `9.30` or `0930`.
 *
 * @returns `HH:MM`, or undefined when it is no time
 */
export function parseTimeOfDay(typed: string): string | undefined {
  const [, hour, minute] = /^(\d{1,2})[:.](\d{2})$/.exec(typed.trim()) ?? /^(\d{2})(\d{2})$/.exec(typed.trim()) ?? []
  if (!hour || !minute || Number(hour) > 23 || Number(minute) > 59) return undefined
  return `${pad(hour)}:${minute}`
}
