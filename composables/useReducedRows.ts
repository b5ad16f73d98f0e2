import { fittedHeatCapacity, type PlotSeries } from '#shared/heat-capacity/plot-series'
import type { HeatCapacityCurve, LowTemperatureFit } from '#shared/heat-capacity/types'

export const REDUCED_HEADS = ['T/K', 'T²/K²', '(C/T)/(mJ/(mol K²))', 'u(C/T)/(mJ/(mol K²))', 'inside the window', 'fit (C/T)/(mJ/(mol K²))']

const RESTS_AFTER_MS = 300

/**
 * The table behind the plot of C/T against T². It follows when the window rests, for it may have half a million rows.
 *
 * @param from curve, its series, fit, and which points are inside
 */
export function useReducedRows(from: () => { curve: HeatCapacityCurve, series: PlotSeries, fit: LowTemperatureFit | null, windowK: readonly [number, number] }) {
  const rows = shallowRef<(string | number | null)[][]>([])
  let timer: ReturnType<typeof setTimeout> | undefined
  watch(from, () => {
    clearTimeout(timer)
    timer = setTimeout(() => rows.value = table(), rows.value.length > 0 ? RESTS_AFTER_MS : 0)
  }, { immediate: true })
  onScopeDispose(() => clearTimeout(timer))

  function table() {
    const { curve, series, fit, windowK: [low, high] } = from()
    return curve.temperatureK.map((temperature, index) => [
      temperature, series.x[index]!, series.y[index]!, series.error?.[index] ?? null, temperature >= low && temperature <= high ? 'yes' : 'no', fit ? fittedHeatCapacity(fit, temperature) / temperature : null,
    ])
  }
  return rows
}
