import { boardScale } from '#shared/board/scale'
import type { Board } from '#shared/types/board'

const REFRESH_MS = 60_000

/**
 * The board with its helium strip, for the days that the board-view store names; fetched again when those change and, while
 * the page is looked at, every minute.
 *
 * @returns the board, its scale, whether it is being fetched, what went wrong, and a way to try again
 */
export async function useRunBoard() {
  const view = useBoardViewStore()
  const request = useFetch<Board>('/api/board', { query: computed(() => ({ ...view.query, helium: 'yes' })), key: 'run-board' })
  const { data: board, status, error, refresh } = request
  const scale = computed(() => board.value ? boardScale(board.value) : null)
  const isBusy = computed(() => status.value === 'pending')

  // Before the wait: hooks belong to the component only until then.
  let timer: ReturnType<typeof setInterval> | undefined
  onMounted(() => {
    timer = setInterval(() => {
      if (document.visibilityState === 'visible') void refresh()
    }, REFRESH_MS)
  })
  onBeforeUnmount(() => clearInterval(timer))

  await request
  return { board, scale, isBusy, error, refresh }
}
