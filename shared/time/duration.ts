/** Hours of a span, true also across a change of the clock. */
export function hoursBetween(startsAt: Date, endsAt: Date): number {
  return (endsAt.getTime() - startsAt.getTime()) / 3_600_000
}
