import { describe, expect, it } from 'vitest'
import { readColumnHead } from '#shared/units/column-heads'
import { HEAT_CAPACITY_UNITS } from '#shared/units/heat-capacity-units'

describe('column heads', () => {
  it.each([
    'T/K', 'T (K)', 'T [K]', 'T_K', 'T K', 'Temp (K)', 'Temperature/K', 'Temperature (K)', 'Sample Temp (Kelvin)', '\uFEFFT / K', 'T, K',
  ])('reads %s as temperature in K', (head) => {
    expect(readColumnHead(head)).toEqual({ quantity: 'temperature', unit: 'K' })
  })

  it.each([
    'C/(mJ/(mol K))', 'C (mJ/(mol K))', 'C [mJ/mol-K]', 'C_mJ_per_mol_K', 'Cp mJ/(mol K)', 'C_p / (mJ mol^-1 K^-1)', 'C_p/(mJ mol⁻¹ K⁻¹)', 'Heat capacity (mJ/mol/K)', 'Cp(mJ/mol K)', 'C / mJ/(mol K)', 'Specific heat, mJ/mol-K', 'Heat capacity in mJ/(mol K)', 'C_p,m/(mJ/(mol K))',
  ])('reads %s as heat capacity in mJ/(mol K)', (head) => {
    expect(readColumnHead(head)).toEqual({ quantity: 'heatCapacity', unit: 'mJ/(mol K)' })
  })

  it.each([
    'σ(C)/(mJ/(mol K))', 'sigma C (mJ/(mol K))', 'sigma_C_mJ_per_mol_K', 'u(C)/(mJ/(mol K))', 'C err (mJ/mol-K)', 'dC [mJ/mol/K]', 'Heat capacity error (mJ/mol/K)', 'uncertainty (mJ/(mol K))', 'ΔC/(mJ/(mol K))',
  ])('reads %s as the uncertainty in mJ/(mol K)', (head) => {
    expect(readColumnHead(head)).toEqual({ quantity: 'sigma', unit: 'mJ/(mol K)' })
  })

  it('reads an uncertainty in per cent', () => {
    expect(readColumnHead('σ(C)/%')).toEqual({ quantity: 'sigma', unit: '%' })
    expect(readColumnHead('error (%)')).toEqual({ quantity: 'sigma', unit: '%' })
  })

  it('leaves the unit open where the head does not say it', () => {
    expect(readColumnHead('T')).toEqual({ quantity: 'temperature' })
    expect(readColumnHead('Heat capacity')).toEqual({ quantity: 'heatCapacity' })
    expect(readColumnHead('C (arb. units)').quantity).not.toBe('temperature')
  })

  it.each(['Field (Oe)', 'comment', 'C/T (mJ/(mol K^2))', 'time_s', 'p/mbar', 'σ(T)/K', 'Chi2', '', 's'])('takes %s for none of the three', (head) => {
    expect(readColumnHead(head)).toEqual({ quantity: 'unknown' })
  })

  it('comes back from both styles for every unit', () => {
    for (const unit of HEAT_CAPACITY_UNITS) {
      expect(readColumnHead(`C/(${unit})`)).toEqual({ quantity: 'heatCapacity', unit })
      expect(readColumnHead(`C (${unit})`)).toEqual({ quantity: 'heatCapacity', unit })
      expect(readColumnHead(`C/${unit}`)).toEqual({ quantity: 'heatCapacity', unit })
    }
  })
})
