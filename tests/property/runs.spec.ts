import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DomainError } from '#shared/errors'
import { PHASE_IDS, type PhaseId } from '#shared/planning/types'
import { payByInstant } from '#shared/runs/pay-by'
import { checkNextPhase } from '#shared/runs/phases'
import { overlaps } from '#shared/runs/slot'
import { RUN_STATES, type RunState } from '#shared/runs/states'
import { canStep, RUN_STEPS, transition } from '#shared/runs/transition'

/** States with no arrow out of them in product.md's drawing. */
const ENDS: readonly RunState[] = ['settled', 'declined', 'withdrawn', 'lapsed']
/** The seven states of the straight line, in order. */
const LINE: readonly RunState[] = ['draft', 'asked', 'approved', 'confirmed', 'running', 'finished', 'settled']
const HOUR = 3_600_000
const instant = fc.integer({ min: 0, max: 20_000 }).map(hours => new Date(hours * HOUR))

describe('the life of a run', () => {
  it('never leads outside its states, never back, and ends where it ends', () => {
    fc.assert(fc.property(fc.array(fc.tuple(fc.constantFrom(...RUN_STEPS), fc.constantFrom('', 'because')), { maxLength: 60 }), (steps) => {
      let state: RunState = 'draft'
      for (const [step, reason] of steps) {
        const before = state
        try {
          state = transition(state, step, reason)
          expect(canStep(before, step)).toBe(true)
          expect(RUN_STATES).toContain(state)
          expect(ENDS).not.toContain(before)
          // Along the line by exactly one, or off it to an end.
          if (LINE.includes(state)) expect(LINE.indexOf(state)).toBe(LINE.indexOf(before) + 1)
          else expect(ENDS).toContain(state)
        }
        catch (error) {
          if (!(error instanceof DomainError)) throw error
          expect(state).toBe(before)
        }
      }
    }), { numRuns: 1000 })
  })

  it('takes at most six steps', () => {
    fc.assert(fc.property(fc.array(fc.constantFrom(...RUN_STEPS), { maxLength: 200 }), (steps) => {
      let state: RunState = 'draft'
      let taken = 0
      for (const step of steps.filter(each => each !== 'withdraw' && each !== 'lapse' && each !== 'decline')) {
        if (!canStep(state, step)) continue
        state = transition(state, step)
        taken += 1
      }
      expect(taken).toBe(LINE.indexOf(state))
    }))
  })
})

describe('the phases of a run', () => {
  it('go forward, but for cooling again after measuring, and turn-round is the last', () => {
    fc.assert(fc.property(fc.array(fc.constantFrom(...PHASE_IDS), { maxLength: 40 }), (wanted) => {
      let phase: PhaseId | null = null
      for (const next of wanted) {
        const before: PhaseId | null = phase
        try {
          checkNextPhase(phase, next)
          phase = next
        }
        catch (error) {
          if (!(error instanceof DomainError)) throw error
          continue
        }
        const again = before === 'measure' && next === 'cool-to-base'
        if (before !== null && !again) expect(PHASE_IDS.indexOf(next)).toBeGreaterThan(PHASE_IDS.indexOf(before))
        expect(before).not.toBe('turn-round')
      }
    }))
  })
})

describe('slots', () => {
  it('overlap exactly when an hour of one is an hour of the other', () => {
    const slot = fc.tuple(fc.nat(40), fc.integer({ min: 1, max: 20 })).map(([from, hours]) => ({ from, to: from + hours }))
    const asSlot = ({ from, to }: { from: number, to: number }) => ({ startsAt: new Date(from * HOUR), endsAt: new Date(to * HOUR) })
    fc.assert(fc.property(slot, slot, (a, b) => {
      const hoursOf = ({ from, to }: { from: number, to: number }) => Array.from({ length: to - from }, (_, index) => from + index)
      expect(overlaps(asSlot(a), asSlot(b))).toBe(hoursOf(a).some(hour => hoursOf(b).includes(hour)))
    }))
  })
})

describe('the time to pay by', () => {
  it('leaves an hour, and keeps the term and the day before the start whenever they leave it', () => {
    fc.assert(fc.property(instant, fc.integer({ min: 1, max: 2000 }), fc.integer({ min: 1, max: 240 }), (approvedAt, hoursToStart, term) => {
      const hours = (payByInstant(approvedAt, new Date(approvedAt.getTime() + hoursToStart * HOUR), term).getTime() - approvedAt.getTime()) / HOUR
      expect(hours).toBeGreaterThanOrEqual(1)
      expect(hours).toBeLessThanOrEqual(term)
      expect(hours).toBeLessThanOrEqual(hoursToStart)
      if (hoursToStart >= 25) expect(hours).toBeLessThanOrEqual(hoursToStart - 24)
      expect([1, term, hoursToStart - 24]).toContain(hours)
    }))
  })
})
