import { describe, expect, it } from 'vitest'
import { laneItems } from '#shared/board/lane-items'
import { cellSentence, itemWords } from '#shared/board/words'
import type { BoardRun, BoardRunState } from '#shared/types/board'

const run = (state: BoardRunState, from: number, to: number, more: Partial<BoardRun> = {}): BoardRun => {
  const day = (value: number) => `2027-05-${String(value).padStart(2, '0')}T08:00:00.000Z`
  return {
    id: `${state}-${from}`, number: from, title: `Run ${from}`, groupName: 'Alder', cryostatId: 'petrel', state, startsAt: day(from), endsAt: day(to), phasesStartAt: day(from),
    phases: [], lowestK: 2, heliumLitres: 40, ...more,
  }
}
const closed = (from: number, to: number) => run('taken', from, to, { id: null, number: null, title: 'Taken', groupName: null })

describe('laneItems', () => {
  it('puts requests that compete into one item, also through a third', () => {
    const items = laneItems([run('asked', 10, 12), run('asked', 4, 8), run('asked', 7, 11), run('asked', 12, 14)])
    // 4–8, 7–11 and 10–12 hang together; 12–14 starts when they end.
    expect(items.map(item => item.runs.map(({ number }) => number))).toEqual([[4, 7, 10], [12]])
    expect(items[0]).toMatchObject({ startMs: Date.parse('2027-05-04T08:00Z'), endMs: Date.parse('2027-05-12T08:00Z') })
  })

  it('keeps a long request together with a short one inside it and one after that', () => {
    expect(laneItems([run('asked', 4, 12), run('asked', 5, 6), run('asked', 8, 9)]).map(item => item.runs.length)).toEqual([3])
  })

  it('writes a request lower where a run or a closure holds these days', () => {
    const closure = { id: 'c', cryostatId: 'petrel', reason: 'Pump service', startsAt: '2027-05-20T00:00:00Z', endsAt: '2027-05-22T00:00:00Z' }
    const items = laneItems([run('confirmed', 4, 8), run('asked', 6, 9), run('asked', 12, 14), run('asked', 21, 23)], [closure])
    expect(items.map(item => item.wordsRow)).toEqual([0, 1, 0, 1])
  })
})

describe('words of the board', () => {
  it('name a run, competing requests, and days one may not see into', () => {
    const words = (...runs: BoardRun[]) => itemWords({ key: '', runs, startMs: 0, endMs: 1, wordsRow: 0 })
    expect(words(run('approved', 4, 8))).toEqual({ title: 'Run 4', detail: 'Alder group · waiting for deposit' })
    expect(words(run('asked', 4, 8), run('asked', 5, 9, { groupName: 'Hazel' }))).toEqual({ title: '2 requests', detail: 'Alder, Hazel' })
    expect(words(closed(4, 8))).toEqual({ title: 'Taken', detail: 'another group' })
  })

  it('read a day aloud: cryostat, run, group, state, from and to', () => {
    const cell = { cryostatName: 'Petrel', day: '2027-05-06', closures: [], timeZone: 'Europe/Oslo' }
    expect(cellSentence({ ...cell, runs: [run('running', 4, 8)] })).toBe('Petrel, Thu 6 May: Run 4, Alder group, running, Tue 4 May 10:00 – Sat 8 May 10:00')
    expect(cellSentence({ ...cell, runs: [closed(4, 8)] })).toBe('Petrel, Thu 6 May: Taken, Tue 4 May 10:00 – Sat 8 May 10:00')
    expect(cellSentence({ ...cell, runs: [] })).toBe('Petrel, Thu 6 May: free')
  })
})
