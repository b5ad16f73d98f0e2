import { DomainError } from '#shared/errors'
import { PHASE_IDS, type PhaseId } from '#shared/planning/types'

/** How each phase is named to people. */
export const PHASE_WORDS: Readonly<Record<PhaseId, string>> = {
  'prepare': 'prepare',
  'cool-to-77': 'cool to 77 K',
  'cool-to-base': 'cool to base',
  'measure': 'measure',
  'warm-up': 'warm up',
  'turn-round': 'turn round',
}

/** What the button says that begins a phase. */
export const PHASE_VERBS: Readonly<Record<PhaseId, string>> = {
  'prepare': 'Start preparing',
  'cool-to-77': 'Start cooling to 77 K',
  'cool-to-base': 'Start cooling to base',
  'measure': 'Start measuring',
  'warm-up': 'Start warm-up',
  'turn-round': 'Start turn-round',
}

/**
 * Phases that may follow. Any later one may, since phases are skipped when a run is cut short; from measuring one
 * may go back to cooling, after a quench or a second sample.
 *
 * @param current the phase now, null before the first
 */
export function nextPhases(current: PhaseId | null): PhaseId[] {
  const index = current === null ? -1 : PHASE_IDS.indexOf(current)
  const later = PHASE_IDS.slice(index + 1)
  return current === 'measure' ? ['cool-to-base', ...later] : later
}

/**
 * Refuses a phase that cannot follow.
 *
 * @throws DomainError naming the phases that may
 */
export function checkNextPhase(current: PhaseId | null, next: PhaseId): void {
  const allowed = nextPhases(current)
  if (!allowed.includes(next)) {
    const now = current === null ? 'The run has not begun a phase' : `The run is in the phase “${PHASE_WORDS[current]}”`
    throw new DomainError('conflict', `${now}; “${PHASE_WORDS[next]}” cannot follow. ${allowed.length ? `Choose ${allowed.map(phase => PHASE_WORDS[phase]).join(', ')}.` : 'Finish the run.'}`, ['phase'])
  }
}
