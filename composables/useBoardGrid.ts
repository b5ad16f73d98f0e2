import { moveCursor, type BoardCursor } from '#shared/board/cursor'
import { laneItems, type LaneItem } from '#shared/board/lane-items'
import { daysTouched, type BoardScale } from '#shared/board/scale'
import type { Board, BoardClosure, BoardLane, BoardRun } from '#shared/types/board'

/** A lane with what lies on it. */
export interface LaneContent { lane: BoardLane, items: LaneItem[], closures: BoardClosure[], runs: BoardRun[] }

/** What a person has picked on the board: an item, a closure, or days. */
export type BoardPick
  = | { kind: 'item', lane: number, item: LaneItem }
    | { kind: 'closure', lane: number, closure: BoardClosure }
    | { kind: 'days', lane: number, first: number, last: number }

/** What the grid asks of the page. */
export interface BoardGridEvents {
  shift: (byDays: number) => void
  openRun: (runId: string) => void
  plan: (lane: BoardLane, firstDay: string, lastDay: string) => void
}

/**
 * The board as a grid: where the keyboard is, what is picked, and which days are being marked by pointer or Shift and arrows.
 *
 * @param board the board shown
 * @param scale its days
 * @param events what leaves the grid
 */
export function useBoardGrid(board: Ref<Board>, scale: Ref<BoardScale>, events: BoardGridEvents) {
  const lanes = computed<LaneContent[]>(() => board.value.lanes.map((lane) => {
    const runs = board.value.runs.filter(run => run.cryostatId === lane.id)
    const closures = board.value.closures.filter(closure => closure.cryostatId === lane.id)
    return { lane, runs, closures, items: laneItems(runs, closures) }
  }))
  const cursor = ref<BoardCursor>({ lane: 0, day: Math.max(0, daysTouched(scale.value, Date.parse(board.value.now), Date.parse(board.value.now) + 1)?.first ?? 0) })
  const pick = shallowRef<BoardPick | null>(null)
  // Where marking began: by Shift and arrows, or under the pressed pointer.
  let markedFrom: number | null = null
  let isDragging = false

  /** What touches a day of a lane. */
  function contentOf({ lane, day }: BoardCursor) {
    const [content, at] = [lanes.value[lane], scale.value.days[day]]
    const touches = (span: { startsAt: string, endsAt: string }) => at !== undefined && Date.parse(span.startsAt) < at.endMs && Date.parse(span.endsAt) > at.startMs
    return { content, day: at?.day ?? '', runs: content?.runs.filter(touches) ?? [], closures: content?.closures.filter(touches) ?? [] }
  }

  function mark(lane: number, from: number, to: number) {
    pick.value = { kind: 'days', lane, first: Math.min(from, to), last: Math.max(from, to) }
  }

  function pickAt(place: BoardCursor) {
    const { content, runs, closures } = contentOf(place)
    const item = content?.items.find(candidate => candidate.runs.some(run => runs.includes(run)))
    if (item) pick.value = { kind: 'item', lane: place.lane, item }
    else if (closures[0]) pick.value = { kind: 'closure', lane: place.lane, closure: closures[0] }
    else mark(place.lane, place.day, place.day)
  }

  function enter() {
    const { content, runs, closures } = contentOf(cursor.value)
    const [only] = runs
    const marked = pick.value?.kind === 'days' ? pick.value : { lane: cursor.value.lane, first: cursor.value.day, last: cursor.value.day }
    if (runs.length === 1 && only?.id) events.openRun(only.id)
    else if (runs.length > 0 || closures.length > 0) pickAt(cursor.value)
    else if (content) events.plan(content.lane, scale.value.days[marked.first]?.day ?? '', scale.value.days[marked.last]?.day ?? '')
  }

  function onKey(event: KeyboardEvent) {
    const move = event.altKey ? undefined : moveCursor(cursor.value, { key: event.key, ctrl: event.ctrlKey || event.metaKey }, { lanes: lanes.value.length, days: scale.value.days.length })
    if (move) {
      const marks = event.shiftKey && move.shiftDays === 0 && move.cursor.lane === cursor.value.lane
      markedFrom = marks ? markedFrom ?? cursor.value.day : null
      cursor.value = move.cursor
      if (markedFrom !== null) mark(move.cursor.lane, markedFrom, move.cursor.day)
      else pick.value = null
      if (move.shiftDays !== 0) events.shift(move.shiftDays)
    }
    else if (event.key === 'Enter') enter()
    else if (event.key === ' ') pickAt(cursor.value)
    else if (event.key === 'Escape') clear()
    else return
    event.preventDefault()
  }

  function clear() {
    pick.value = null
    markedFrom = null
    isDragging = false
  }

  // Other days: what was marked on the old ones means nothing any more, and a shorter board has no such day.
  watch(scale, (next) => {
    clear()
    cursor.value = { ...cursor.value, day: Math.min(cursor.value.day, next.days.length - 1) }
  })

  const drag = {
    start(lane: number, day: number) {
      isDragging = true
      markedFrom = day
      cursor.value = { lane, day }
      mark(lane, day, day)
    },
    move(lane: number, day: number) {
      if (isDragging && markedFrom !== null && lane === cursor.value.lane) mark(lane, markedFrom, day)
    },
    end() {
      isDragging = false
      markedFrom = null
    },
  }

  return { lanes, cursor, pick, contentOf, onKey, clear, drag }
}
