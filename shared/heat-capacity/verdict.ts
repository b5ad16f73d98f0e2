import type { CheckResult, Verdict } from '#shared/heat-capacity/types'

const ORDER: readonly Verdict[] = ['ok', 'caution', 'fail']

/**
 * The verdict is the worst check; checks that do not apply say nothing.
 *
 * @param checks results of all checks
 */
export function verdictOf(checks: readonly Pick<CheckResult, 'status'>[]): Verdict {
  return checks.reduce<Verdict>((worst, { status }) => status !== 'not-applicable' && ORDER.indexOf(status) > ORDER.indexOf(worst) ? status : worst, 'ok')
}
