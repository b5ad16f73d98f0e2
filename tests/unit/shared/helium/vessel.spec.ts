import { describe, expect, it } from 'vitest'
import { DomainError } from '#shared/errors'
import { checkCalibration, levelFromLitres, litresFromLevel, vesselCapacityLitres } from '#shared/helium/vessel'

const TABLE = [{ percent: 0, litres: 2 }, { percent: 50, litres: 22 }, { percent: 100, litres: 52 }]

describe('vessel calibration', () => {
  it('reads litres on straight lines between rows', () => {
    expect(litresFromLevel(TABLE, 0)).toBe(2)
    expect(litresFromLevel(TABLE, 25)).toBe(12) // 2 + 20/2
    expect(litresFromLevel(TABLE, 75)).toBe(37) // 22 + 30/2
    expect(litresFromLevel(TABLE, 100)).toBe(52)
  })

  it('turns litres back into the level', () => {
    expect(levelFromLitres(TABLE, 37)).toBe(75)
    expect(vesselCapacityLitres(TABLE)).toBe(52)
  })

  it.each([140, -1, Number.NaN, Infinity])('refuses a level of %s with the remedy', (level) => {
    expect(() => litresFromLevel(TABLE, level)).toThrow(/Enter a level from 0 to 100 %\.$/)
  })

  it('names the level and the field', () => {
    try {
      litresFromLevel(TABLE, 140)
      expect.unreachable()
    }
    catch (error) {
      expect(error).toBeInstanceOf(DomainError)
      expect((error as DomainError).message).toBe('A level of 140 % cannot be. Enter a level from 0 to 100 %.')
      expect((error as DomainError).path).toEqual(['levelPercent'])
    }
  })

  it('refuses litres the vessel cannot show', () => {
    expect(() => levelFromLitres(TABLE, 53)).toThrow(/from 2 L to 52 L/)
    expect(() => levelFromLitres(TABLE, 1)).toThrow(DomainError)
  })

  it('refuses a table that does not rise, naming the row, or does not span 0 to 100 %', () => {
    expect(() => checkCalibration([TABLE[0]!, { percent: 50, litres: 1 }, TABLE[2]!])).toThrow(/Row 2/)
    expect(() => checkCalibration([TABLE[0]!, TABLE[1]!])).toThrow(/from 0 % to 100 %/)
    expect(() => checkCalibration([])).toThrow(DomainError)
  })
})
