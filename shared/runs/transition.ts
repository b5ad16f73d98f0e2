import { DomainError } from '#shared/errors'
import { RUN_STATE_WORDS, type RunState } from '#shared/runs/states'

/** What changes the state of a run. */
export const RUN_STEPS = ['ask', 'approve', 'decline', 'withdraw', 'confirm', 'lapse', 'start', 'finish', 'settle'] as const

/** One step in the life of a run. */
export type RunStep = (typeof RUN_STEPS)[number]

interface Rule {
  readonly from: readonly RunState[]
  readonly to: RunState
  /** Whether a person must say why. */
  readonly needsReason?: boolean
}

/** The whole life of a run; nothing else changes its state. */
const RULES: Readonly<Record<RunStep, Rule>> = {
  ask: { from: ['draft'], to: 'asked' },
  approve: { from: ['asked'], to: 'approved' },
  decline: { from: ['asked'], to: 'declined', needsReason: true },
  withdraw: { from: ['asked', 'approved', 'confirmed'], to: 'withdrawn' },
  confirm: { from: ['approved'], to: 'confirmed' },
  lapse: { from: ['approved'], to: 'lapsed' },
  start: { from: ['confirmed'], to: 'running' },
  finish: { from: ['running'], to: 'finished' },
  settle: { from: ['finished'], to: 'settled' },
}

/**
 * The state a step leads to, or a refusal.
 *
 * @param state the run's state now
 * @param step what is to be done
 * @param reason what the actor said, where the step asks for it
 * @returns the new state
 * @throws DomainError `conflict` when the run is not where the step begins, `invalid` when a reason is missing
 */
export function transition(state: RunState, step: RunStep, reason = ''): RunState {
  const rule = RULES[step]
  if (!rule.from.includes(state)) {
    const wanted = rule.from.map(from => RUN_STATE_WORDS[from]).join(' or ')
    throw new DomainError('conflict', `This run is ${RUN_STATE_WORDS[state]}; that can be done only while it is ${wanted}. Reload to see what changed.`)
  }
  if (rule.needsReason && reason.trim() === '') throw new DomainError('invalid', 'Say why, so that the group knows what to change.', ['reason'])
  return rule.to
}

/** Whether a step can be taken from a state; for buttons. */
export function canStep(state: RunState, step: RunStep): boolean {
  return RULES[step].from.includes(state)
}
