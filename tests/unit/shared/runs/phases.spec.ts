import { describe, expect, it } from 'vitest'
import { PHASE_IDS } from '#shared/planning/types'
import { checkNextPhase, nextPhases, PHASE_VERBS, PHASE_WORDS } from '#shared/runs/phases'

describe('the phase that may follow', () => {
  // Any later phase may, since a run can be cut short; from measuring also back to cooling.
  it.each([
    [null, ['prepare', 'cool-to-77', 'cool-to-base', 'measure', 'warm-up', 'turn-round']],
    ['prepare', ['cool-to-77', 'cool-to-base', 'measure', 'warm-up', 'turn-round']],
    ['cool-to-77', ['cool-to-base', 'measure', 'warm-up', 'turn-round']],
    ['cool-to-base', ['measure', 'warm-up', 'turn-round']],
    ['measure', ['cool-to-base', 'warm-up', 'turn-round']],
    ['warm-up', ['turn-round']],
    ['turn-round', []],
  ] as const)('after %s is one of %j', (current, allowed) => {
    expect(nextPhases(current)).toEqual(allowed)
    for (const next of PHASE_IDS) {
      if ((allowed as readonly string[]).includes(next)) expect(() => checkNextPhase(current, next)).not.toThrow()
      else expect(() => checkNextPhase(current, next)).toThrow(expect.objectContaining({ code: 'conflict', path: ['phase'] }))
    }
  })

  it('is named when another is asked for', () => {
    expect(() => checkNextPhase('warm-up', 'measure')).toThrow('The run is in the phase “warm up”; “measure” cannot follow. Choose turn round.')
    expect(() => checkNextPhase('turn-round', 'prepare')).toThrow('The run is in the phase “turn round”; “prepare” cannot follow. Finish the run.')
    expect(() => checkNextPhase('measure', 'measure')).toThrow('Choose cool to base, warm up, turn round.')
  })

  it('has a word and a verb for every phase, each its own', () => {
    expect(new Set(PHASE_IDS.map(phase => PHASE_WORDS[phase])).size).toBe(PHASE_IDS.length)
    expect(new Set(PHASE_IDS.map(phase => PHASE_VERBS[phase])).size).toBe(PHASE_IDS.length)
    expect(PHASE_IDS.every(phase => PHASE_VERBS[phase].startsWith('Start '))).toBe(true)
  })
})
