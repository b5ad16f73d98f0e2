import { scaleLinear, scaleLog } from 'd3-scale'
import { type ComputedRef, type InjectionKey, inject } from 'vue'

/** One axis: its title as quantity / unit, what it spans, and how. */
export interface PlotAxis {
  /** e.g. `T² / K²` */
  label: string
  domain: readonly [number, number]
  scale?: 'linear' | 'log'
  /** Where lines and numbers stand; chosen by the scale when absent. */
  ticks?: readonly number[]
  format?: (value: number) => string
}

/** Points to draw; arrays of the same length. `index` names the points of the data behind, where some are left out. */
export interface PlotSeriesData {
  readonly x: readonly number[]
  readonly y: readonly number[]
  /** Half length of the error bars, in units of y. */
  readonly error?: readonly number[]
  readonly index?: readonly number[]
}

/** What the parts of a plot need from its frame. */
export interface PlotContext {
  /** Data to px. */
  x: (value: number) => number
  y: (value: number) => number
  /** Place of a pointer (clientX) to data. */
  valueAt: (clientX: number) => number
  /** Data area, px of the drawing. */
  left: number
  right: number
  top: number
  bottom: number
}

/** A tick of an axis. */
export interface PlotTick { value: number, at: number, text: string }

export const PLOT_KEY: InjectionKey<ComputedRef<PlotContext>> = Symbol('plot')

/** The frame around a part of a plot. */
export function usePlot(): ComputedRef<PlotContext> {
  const plot = inject(PLOT_KEY)
  if (!plot) throw new Error('A part of a plot stands outside a PlotFrame.')
  return plot
}

const MINUS = '\u2212'
const plain = (value: number) => String(Number(value.toPrecision(6))).replace('-', MINUS)

/** The scale of an axis over a stretch of px, with its inverse and its ticks. */
export function plotScale(axis: PlotAxis, range: readonly [number, number], wantedTicks: number) {
  const scale = (axis.scale === 'log' ? scaleLog() : scaleLinear()).domain([...axis.domain]).range([...range])
  const chosen = axis.ticks ?? (axis.scale === 'log' ? logTicks(axis.domain) : scale.ticks(wantedTicks))
  const [low, high] = [Math.min(...axis.domain), Math.max(...axis.domain)]
  const ticks = chosen.filter(value => value >= low && value <= high).map((value): PlotTick => ({ value, at: scale(value), text: (axis.format ?? plain)(value) }))
  return { to: (value: number) => scale(value), from: (px: number) => scale.invert(px), ticks }
}

/** Decades; with 2 and 5 between where there are fewer than three. */
function logTicks([from, to]: readonly [number, number]): number[] {
  const [low, high] = [Math.floor(Math.log10(Math.min(from, to))), Math.ceil(Math.log10(Math.max(from, to)))]
  const decades = Array.from({ length: high - low + 1 }, (_, step) => Number(`1e${low + step}`))
  return high - low > 3 ? decades : decades.flatMap(decade => [decade, 2 * decade, 5 * decade])
}
