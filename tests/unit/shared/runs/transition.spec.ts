import { describe, expect, it } from 'vitest'
import { DomainError } from '#shared/errors'
import { HOLDING_STATES, RUN_STATE_WORDS, RUN_STATES, type RunState } from '#shared/runs/states'
import { canStep, RUN_STEPS, type RunStep, transition } from '#shared/runs/transition'

/** The life of a run as product.md draws it, arrow by arrow. */
const ARROWS: [RunState, RunStep, RunState][] = [
  ['draft', 'ask', 'asked'],
  ['asked', 'approve', 'approved'], ['asked', 'decline', 'declined'], ['asked', 'withdraw', 'withdrawn'],
  ['approved', 'confirm', 'confirmed'], ['approved', 'lapse', 'lapsed'], ['approved', 'withdraw', 'withdrawn'],
  ['confirmed', 'start', 'running'], ['confirmed', 'withdraw', 'withdrawn'],
  ['running', 'finish', 'finished'],
  ['finished', 'settle', 'settled'],
]
const arrowOf = (state: RunState, step: RunStep) => ARROWS.find(([from, by]) => from === state && by === step)
const pairs = RUN_STATES.flatMap(state => RUN_STEPS.map(step => [state, step] as const))

describe('the life of a run', () => {
  it.each(pairs)('from %s, %s leads where it should or nowhere', (state, step) => {
    const arrow = arrowOf(state, step)
    expect(canStep(state, step)).toBe(arrow !== undefined)
    if (arrow) expect(transition(state, step, 'a reason')).toBe(arrow[2])
    else expect(() => transition(state, step, 'a reason')).toThrow(DomainError)
  })

  it('has no way out of its ends', () => {
    const ends = RUN_STATES.filter(state => !RUN_STEPS.some(step => canStep(state, step)))
    expect(ends).toEqual(['settled', 'declined', 'withdrawn', 'lapsed'])
  })

  it('says what the run is and when the step could be taken', () => {
    expect(() => transition('running', 'withdraw')).toThrow('This run is running; that can be done only while it is asked for or waiting for deposit or confirmed. Reload to see what changed.')
    expect(() => transition('confirmed', 'approve')).toThrow(expect.objectContaining({ code: 'conflict' }))
  })

  it.each(['', '   '])('declines only with a reason, not %j', (reason) => {
    expect(() => transition('asked', 'decline', reason)).toThrow(expect.objectContaining({ code: 'invalid', path: ['reason'], message: 'Say why, so that the group knows what to change.' }))
  })

  it('names the wrong state before a missing reason, since a reason would not help', () => {
    expect(() => transition('approved', 'decline')).toThrow(expect.objectContaining({ code: 'conflict' }))
  })

  it('holds the cryostat from approval until it is finished', () => {
    expect(HOLDING_STATES).toEqual(['approved', 'confirmed', 'running'])
  })

  it('has words for each state, and no two alike', () => {
    expect(new Set(RUN_STATES.map(state => RUN_STATE_WORDS[state])).size).toBe(RUN_STATES.length)
  })
})
