import { formatQuantity } from './format-number'

/** A temperature for people: `1.552 K`, `20 mK`, `300 K`. */
export function formatTemperature(temperatureK: number): string {
  if (temperatureK < 0.1) return formatQuantity(temperatureK * 1000, 'mK', temperatureK < 0.01 ? 1 : 0)
  if (temperatureK < 10) return formatQuantity(temperatureK, 'K', 3)
  return formatQuantity(temperatureK, 'K', temperatureK < 100 ? 2 : 0)
}

/** A temperature as a limit or a label, without trailing zeros: `0.3 K`, `4.2 K`, `20 mK`. */
export function formatTemperatureShort(temperatureK: number): string {
  const [value, unit] = temperatureK < 0.1 ? [temperatureK * 1000, 'mK'] : [temperatureK, 'K']
  return `${Number(value.toPrecision(3))}\u2009${unit}`
}
