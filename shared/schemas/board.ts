import { z } from 'zod'
import { MOST_BOARD_DAYS } from '#shared/board/scale'
import { daySchema } from '#shared/schemas/common'
import { daysBetween } from '#shared/time/facility-time'

/** Days of the facility that the board or the helium strip shows: the first, and the day after the last; neither for the usual two weeks. */
export const boardQuery = z.object({ from: daySchema.optional(), to: daySchema.optional() }).strict().superRefine(({ from, to }, context) => {
  if (from === undefined && to === undefined) return
  if (from === undefined || to === undefined) {
    context.addIssue({ code: 'custom', path: [from === undefined ? 'from' : 'to'], message: 'Give both the first day and the day after the last, or neither.' })
    return
  }
  const days = daysBetween(from, to)
  if (days < 1 || days > MOST_BOARD_DAYS) context.addIssue({ code: 'custom', path: ['to'], message: `The board shows 1 to ${MOST_BOARD_DAYS} days. Choose a last day after the first.` })
})

/** The same for the board, with the helium strip of the same days where it is asked for: one request for the whole page. */
export const boardWithHeliumQuery = z.object({ from: z.string().optional(), to: z.string().optional(), helium: z.literal('yes').optional() }).strict()
  .transform(({ helium, ...range }) => ({ range, withHelium: helium === 'yes' }))
  .pipe(z.object({ range: boardQuery, withHelium: z.boolean() }))

/** A month of the calendar. */
export const boardMonthQuery = z.object({ month: z.string().regex(/^\d{4}-(0[1-9]|1[0-2])$/, 'Enter a month such as 2027-05.') }).strict()
