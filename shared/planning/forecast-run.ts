import type { ForecastRun } from '#shared/helium/forecast'
import { layEstimate } from '#shared/planning/phases'
import type { RunEstimate } from '#shared/planning/types'

/**
 * Turns the estimate of a run into what a forecast carries forward: the litres drawn in each phase, over real time.
 *
 * @param run Identity, whether it holds its days, its start in ms UTC, and its estimate.
 * @returns The run for `forecastStock`; without draws for a closed cycle.
 * @throws DomainError when the start is no instant.
 */
export function forecastRun(
  run: { readonly runId: string, readonly held: boolean, readonly startMs: number, readonly estimate: Pick<RunEstimate, 'phases'> },
): ForecastRun {
  const laid = layEstimate(run.estimate, run.startMs)
  return {
    runId: run.runId,
    held: run.held,
    draws: run.estimate.phases.flatMap(({ phase, drawnLitres, drawnSdLitres }) => {
      const when = laid.find(candidate => candidate.phase === phase)
      return when && drawnLitres > 0 ? [{ startMs: when.startMs, endMs: when.endMs, litres: drawnLitres, sdLitres: drawnSdLitres }] : []
    }),
  }
}
