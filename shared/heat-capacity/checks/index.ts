import { addenda } from '#shared/heat-capacity/checks/addenda'
import { classicalShare } from '#shared/heat-capacity/checks/classical-share'
import type { Check, CheckContext } from '#shared/heat-capacity/checks/context'
import { coverage } from '#shared/heat-capacity/checks/coverage'
import { debyeRange } from '#shared/heat-capacity/checks/debye-range'
import { electronicTerm } from '#shared/heat-capacity/checks/electronic-term'
import { freeElectron } from '#shared/heat-capacity/checks/free-electron'
import { handbook } from '#shared/heat-capacity/checks/handbook'
import { mass } from '#shared/heat-capacity/checks/mass'
import { repeat } from '#shared/heat-capacity/checks/repeat'
import { residuals } from '#shared/heat-capacity/checks/residuals'
import { scale } from '#shared/heat-capacity/checks/scale'
import { standard } from '#shared/heat-capacity/checks/standard'
import { transition } from '#shared/heat-capacity/checks/transition'
import { upturn } from '#shared/heat-capacity/checks/upturn'
import { zeroAtZero } from '#shared/heat-capacity/checks/zero-at-zero'
import type { CheckId, CheckResult } from '#shared/heat-capacity/types'

/** Every check by its id, in the order they are shown. */
export const CHECKS: Readonly<Record<CheckId, Check>> = {
  'scale': scale,
  'electronic-term': electronicTerm,
  'free-electron': freeElectron,
  'handbook': handbook,
  'debye-range': debyeRange,
  'zero-at-zero': zeroAtZero,
  'classical-share': classicalShare,
  'transition': transition,
  'upturn': upturn,
  'residuals': residuals,
  'coverage': coverage,
  'addenda': addenda,
  'repeat': repeat,
  'mass': mass,
  'standard': standard,
}

/**
 * Runs every check on a result.
 *
 * @param context curve, sample, fit and limits
 * @returns one result a check, in their order
 */
export function runChecks(context: CheckContext): CheckResult[] {
  return Object.values(CHECKS).map(check => check(context))
}
