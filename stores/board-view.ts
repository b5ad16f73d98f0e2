import { addDays, mondayOf } from '#shared/time/facility-time'

export const BOARD_RANGES = ['1w', '2w', '4w', 'month'] as const
export type BoardRange = (typeof BOARD_RANGES)[number]

const DAYS: Record<BoardRange, number> = { '1w': 7, '2w': 14, '4w': 28, 'month': 14 }

/** How a person looks at the board; kept while they go to a run and come back. */
export const useBoardViewStore = defineStore('board-view', () => {
  const range = ref<BoardRange>('2w')
  /** First day shown; null for this week's Monday, which the server knows. */
  const firstDay = ref<string | null>(null)
  /** The lane shown on phones, by slug; null for the first. */
  const cryostat = ref<string | null>(null)
  const isList = ref(false)

  const days = computed(() => DAYS[range.value])
  const query = computed(() => firstDay.value === null ? {} : { from: firstDay.value, to: addDays(firstDay.value, days.value) })

  /** Moves the board, from the first day it shows now. */
  function shift(from: string, byDays: number) {
    firstDay.value = addDays(from, byDays)
  }

  /** Shows another stretch of time, beginning in the same week. */
  function choose(next: BoardRange, from: string) {
    range.value = next
    firstDay.value = mondayOf(from)
  }

  /** Goes to the week of a day. */
  function goTo(day: string) {
    firstDay.value = mondayOf(day)
  }

  return { range, firstDay, cryostat, isList, days, query, shift, choose, goTo }
})
