import { describe, expect, it } from 'vitest'
import { PHASE_IDS, type PhaseId } from '#shared/planning/types'
import { checkNextPhase, nextPhases, PHASE_VERBS, PHASE_WORDS } from '#shared/runs/phases'

/** Phases that may follow each: any later one; from measuring also cooling again. */
const NEXT: [PhaseId | null, PhaseId[]][] = [
  [null, ['prepare', 'cool-to-77', 'cool-to-base', 'measure', 'warm-up', 'turn-round']],
  ['prepare', ['cool-to-77', 'cool-to-base', 'measure', 'warm-up', 'turn-round']],
  ['cool-to-77', ['cool-to-base', 'measure', 'warm-up', 'turn-round']],
  ['cool-to-base', ['measure', 'warm-up', 'turn-round']],
  ['measure', ['cool-to-base', 'warm-up', 'turn-round']],
  ['warm-up', ['turn-round']],
  ['turn-round', []],
]

describe('the phases of a running run', () => {
  it.each(NEXT)('after %s', (current, following) => {
    expect(nextPhases(current)).toEqual(following)
    for (const phase of PHASE_IDS) {
      if (following.includes(phase)) expect(() => checkNextPhase(current, phase)).not.toThrow()
      else expect(() => checkNextPhase(current, phase)).toThrow(expect.objectContaining({ code: 'conflict', path: ['phase'] }))
    }
  })

  it('says where the run is and which phases may follow', () => {
    expect(() => checkNextPhase('warm-up', 'measure')).toThrow('The run is in the phase “warm up”; “measure” cannot follow. Choose turn round.')
    expect(() => checkNextPhase('turn-round', 'prepare')).toThrow('The run is in the phase “turn round”; “prepare” cannot follow. Finish the run.')
  })

  it('has a name and a verb for each', () => {
    for (const phase of PHASE_IDS) {
      expect(PHASE_WORDS[phase]).toMatch(/^[a-z]/)
      expect(PHASE_VERBS[phase]).toMatch(/^Start /)
    }
  })
})
