import { describe, expect, it } from 'vitest'
import { phasesAsRun } from '#shared/board/phases-as-run'

const HOUR = 3_600_000
const planned = [{ phase: 'prepare', hours: 4 }, { phase: 'cool-to-base', hours: 8 }, { phase: 'measure', hours: 16 }, { phase: 'warm-up', hours: 6 }] as const

describe('phasesAsRun', () => {
  it('keeps the plan where nothing was logged', () => {
    expect(phasesAsRun(planned, [])).toEqual({ startMs: undefined, phases: planned })
  })

  it('takes logged phases for the past and the plan for what is to come', () => {
    const logged = [{ phase: 'cool-to-base', atMs: 5 * HOUR }, { phase: 'prepare', atMs: 2 * HOUR }] as const
    expect(phasesAsRun(planned, logged)).toEqual({
      startMs: 2 * HOUR,
      phases: [{ phase: 'prepare', hours: 3 }, { phase: 'cool-to-base', hours: 8 }, { phase: 'measure', hours: 16 }, { phase: 'warm-up', hours: 6 }],
    })
  })

  it('ends the last phase with a finished run, and leaves out what it never began', () => {
    const logged = [{ phase: 'prepare', atMs: 0 }, { phase: 'measure', atMs: 4 * HOUR }] as const
    expect(phasesAsRun(planned, logged, 9 * HOUR).phases).toEqual([{ phase: 'prepare', hours: 4 }, { phase: 'measure', hours: 5 }])
  })

  it('keeps a second cooldown, after a quench', () => {
    const logged = [{ phase: 'measure', atMs: 0 }, { phase: 'cool-to-base', atMs: 3 * HOUR }] as const
    expect(phasesAsRun(planned, logged).phases.map(({ phase }) => phase)).toEqual(['measure', 'cool-to-base', 'measure', 'warm-up'])
  })
})
