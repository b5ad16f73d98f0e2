import { describe, expect, it } from 'vitest'
import { DomainError } from '#shared/errors'
import { HOLDING_STATES, RUN_STATES, RUN_STATE_WORDS, type RunState } from '#shared/runs/states'
import { canStep, RUN_STEPS, type RunStep, transition } from '#shared/runs/transition'

/**
 * The life of a run as product.md draws it, arrow by arrow; every pair that is not here is refused.
 *
 *     draft → asked → approved → confirmed → running → finished → settled
 *     asked → declined | withdrawn      approved → lapsed | withdrawn
 *     confirmed → withdrawn             running → finished
 */
const ARROWS: readonly [RunState, RunStep, RunState][] = [
  ['draft', 'ask', 'asked'],
  ['asked', 'approve', 'approved'],
  ['approved', 'confirm', 'confirmed'],
  ['confirmed', 'start', 'running'],
  ['running', 'finish', 'finished'],
  ['finished', 'settle', 'settled'],
  ['asked', 'decline', 'declined'],
  ['asked', 'withdraw', 'withdrawn'],
  ['approved', 'lapse', 'lapsed'],
  ['approved', 'withdraw', 'withdrawn'],
  ['confirmed', 'withdraw', 'withdrawn'],
]
const PAIRS = RUN_STATES.flatMap(state => RUN_STEPS.map(step => ({ state, step, to: ARROWS.find(([from, by]) => from === state && by === step)?.[2] })))

describe('the life of a run', () => {
  it('has ten states and nine steps', () => {
    expect([RUN_STATES.length, RUN_STEPS.length, PAIRS.length]).toEqual([10, 9, 90])
  })

  it.each(PAIRS)('$step on $state leads to $to', ({ state, step, to }) => {
    expect(canStep(state, step)).toBe(to !== undefined)
    if (to !== undefined) {
      expect(transition(state, step, 'because')).toBe(to)
      return
    }
    try {
      transition(state, step, 'because')
      expect.unreachable('the step must be refused')
    }
    catch (error) {
      expect(error).toBeInstanceOf(DomainError)
      expect((error as DomainError).code).toBe('conflict')
      expect((error as DomainError).message).toContain(`This run is ${RUN_STATE_WORDS[state]};`)
    }
  })

  it('says where the run is, where it would have to be, and what to do', () => {
    expect(() => transition('settled', 'withdraw')).toThrow('This run is settled; that can be done only while it is asked for or waiting for deposit or confirmed. Reload to see what changed.')
  })

  it('asks for a reason to decline, and for no other step', () => {
    for (const reason of ['', '   ', '\n']) {
      try {
        transition('asked', 'decline', reason)
        expect.unreachable('a reason is needed')
      }
      catch (error) {
        expect(error).toMatchObject({ code: 'invalid', message: 'Say why, so that the group knows what to change.', path: ['reason'] })
      }
    }
    for (const [from, step, to] of ARROWS.filter(([, step]) => step !== 'decline')) expect(transition(from, step)).toBe(to)
  })

  it('has no way out of its ends', () => {
    expect(RUN_STATES.filter(state => !RUN_STEPS.some(step => canStep(state, step)))).toEqual(['settled', 'declined', 'withdrawn', 'lapsed'])
  })

  it('names being in the wrong state before a missing reason', () => {
    expect(() => transition('running', 'decline')).toThrow('This run is running')
  })
})

describe('the states of a run', () => {
  it('hold the cryostat from approval until the end', () => {
    // product.md: approved, confirmed and running hold the cryostat.
    expect([...HOLDING_STATES].sort()).toEqual(['approved', 'confirmed', 'running'])
  })

  it('are each named once to people', () => {
    const words = RUN_STATES.map(state => RUN_STATE_WORDS[state])
    expect(new Set(words).size).toBe(RUN_STATES.length)
    expect(words.every(word => /^[a-z][a-z ]+$/.test(word))).toBe(true)
  })
})
