import { describe, expect, it } from 'vitest'
import { formatTemperature, formatTemperatureShort } from '#shared/utils/format-temperature'

describe('a temperature for people', () => {
  it.each([
    [1.552, '1.552\u2009K'], [0.3, '0.300\u2009K'], [0.1, '0.100\u2009K'], [0.02, '20\u2009mK'], [0.0075, '7.5\u2009mK'], [4.2, '4.200\u2009K'],
    [10, '10.00\u2009K'], [77.36, '77.36\u2009K'], [99.994, '99.99\u2009K'], [100, '100\u2009K'], [300, '300\u2009K'], [295.6, '296\u2009K'],
  ])('%d K is %j', (temperatureK, text) => {
    expect(formatTemperature(temperatureK)).toBe(text)
  })

  it.each([[0.3, '0.3\u2009K'], [4.2, '4.2\u2009K'], [0.02, '20\u2009mK'], [0.0075, '7.5\u2009mK'], [300, '300\u2009K'], [1.8, '1.8\u2009K'], [2.1768, '2.18\u2009K']])('as a limit, %d K is %j', (temperatureK, text) => {
    expect(formatTemperatureShort(temperatureK)).toBe(text)
  })
})
