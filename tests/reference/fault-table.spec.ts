import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { schottkyHeatCapacity } from '#shared/heat-capacity/debye'
import type { Asked } from '../support/heat-capacity-files'
import { checkText, copperLaw, measuredTable, metalLaw, sapphireLaw, silverLaw, statuses } from '../support/heat-capacity-files'

/**
 * Spoiled and sound files, each with the verdict it must get and the checks that must say so. Curves are made from the copper reference
 * equation and handbook values with seeded noise (tests/support/heat-capacity-files.ts); file A is a real measurement (SOURCE.md).
 */
interface Case {
  name: string
  text: string
  asked: Asked
  verdict: 'ok' | 'caution' | 'fail'
  /** Checks that must have this status. */
  checks?: Record<string, string>
  /** First suggestion, or none. */
  suggestion?: string | null
  /** Rows that must be left out. */
  rejected?: number
  /** Words that must stand in the message of a check. */
  says?: Record<string, RegExp>
}

const OXIDE = readFileSync(new URL('data/heat-capacity/A_oxide_with_schottky_upturn_MIT.csv', import.meta.url), 'utf8')
const SILVER_WARM = readFileSync(new URL('data/heat-capacity/E_Ag_1932_1941_facts.csv', import.meta.url), 'utf8')

const copper = (more: Partial<Parameters<typeof measuredTable>[0]> = {}) => measuredTable({ law: copperLaw, fromK: 1.3, toK: 6.6, ...more })
const silver = (more: Partial<Parameters<typeof measuredTable>[0]> = {}) => measuredTable({ law: silverLaw, fromK: 1.2, toK: 4.4, ...more })
const cu: Asked = { formula: 'Cu' }
const ag: Asked = { formula: 'Ag' }
const WHOLE_CU: [number, number] = [1.2, 6.7]
const WHOLE_AG: [number, number] = [1.1, 4.5]
const MILLIMOLE_CU = 412.6 / 63.546
/** Tantalum: γ 5.9, Θ_D 240 K, T_c 4.47 K (handbook); below T_c a weak-coupling-like electronic part that jumps by 1.43 γT_c. */
const tantalum = metalLaw(5.9, 240)
const tantalumSuperconducting = (t: number) => t < 4.47 ? 2.43 * 5.9 * 4.47 * (t / 4.47) ** 3 + tantalum(t) - 5.9 * t : tantalum(t)
/** Two nuclear levels 20 mK apart, as of a rare earth, on copper's curve. */
const withTail = (t: number) => copperLaw(t) + 8 / t ** 2
const decimalCommas = (text: string) => text.replaceAll(',', ';').replaceAll('.', ',')
const spoil = (text: string, edit: (cells: string[], row: number) => string[]) => text.split('\n').map((line, row) => row === 0 || line === '' ? line : edit(line.split(','), row).join(',')).join('\n')

const CASES: Case[] = [
  // Sound ones: each must pass, or the table would prove nothing.
  { name: 'sound copper', text: copper(), asked: cu, verdict: 'ok', checks: { 'scale': 'ok', 'handbook': 'ok', 'electronic-term': 'ok', 'debye-range': 'ok' }, suggestion: null },
  { name: 'sound silver', text: silver(), asked: ag, verdict: 'ok', suggestion: null },
  { name: 'sound silver without stated errors', text: silver({ withSigma: false, noise: 0.01 }), asked: ag, verdict: 'ok', suggestion: null },
  { name: 'sound sapphire', text: measuredTable({ law: sapphireLaw, fromK: 3, toK: 20, noise: 0.01 }), asked: { formula: 'Al2O3', kind: 'insulator' }, verdict: 'ok', checks: { 'electronic-term': 'ok', 'free-electron': 'not-applicable' }, suggestion: null },
  { name: 'sound copper with decimal commas and semicolons', text: decimalCommas(copper()), asked: cu, verdict: 'ok', rejected: 0 },
  { name: 'sound copper in J per whole sample', text: copper({ unit: 'µJ/K', factor: MILLIMOLE_CU }), asked: { ...cu, massMg: 412.6, massUncertaintyMg: 0.2 }, verdict: 'ok', checks: { mass: 'ok' }, suggestion: null },
  { name: 'sound tantalum above its transition', text: measuredTable({ law: tantalum, fromK: 4.6, toK: 12 }), asked: { formula: 'Ta', kind: 'superconductor', criticalTemperatureK: 4.47, windowK: [4.55, 12.1] }, verdict: 'caution', checks: { 'transition': 'ok', 'debye-range': 'caution', 'handbook': 'ok' } },
  { name: 'copper with a nuclear tail, tail in the model', text: copper({ law: withTail }), asked: { ...cu, terms: ['gamma', 'beta3', 'tail'], windowK: WHOLE_CU }, verdict: 'ok', checks: { upturn: 'ok' } },
  { name: 'the real oxide with the tail', text: OXIDE, asked: { formula: 'Dy2O3', kind: 'insulator', terms: ['gamma', 'beta3', 'tail'], windowK: [1.8, 14.6] }, verdict: 'caution', checks: { 'upturn': 'ok', 'electronic-term': 'ok' } },

  // Slips of unit and mass.
  { name: 'J written under a head of mJ', text: copper({ factor: 1e-3 }), asked: cu, verdict: 'fail', checks: { scale: 'fail', handbook: 'fail' }, suggestion: 'multiply-by-1000', says: { scale: /factor of 1\/1000/ } },
  { name: 'mJ written under a head of J', text: copper({ unit: 'J/(mol K)' }), asked: cu, verdict: 'fail', checks: { scale: 'fail', handbook: 'fail' }, suggestion: 'divide-by-1000', says: { scale: /factor of 1000/ } },
  { name: 'mJ under a head of J, material not in the handbook', text: measuredTable({ law: metalLaw(3, 280, 2), fromK: 1.5, toK: 7, unit: 'J/(mol K)' }), asked: { formula: 'LaAl2', kind: 'metal' }, verdict: 'fail', checks: { scale: 'fail', handbook: 'not-applicable' }, suggestion: 'divide-by-1000' },
  { name: 'J under a head of mJ, material not in the handbook', text: measuredTable({ law: metalLaw(3, 280, 3), fromK: 1.5, toK: 5.5, factor: 1e-3 }), asked: { formula: 'LaAl2', kind: 'metal' }, verdict: 'fail', checks: { scale: 'fail', handbook: 'not-applicable' }, suggestion: 'multiply-by-1000' },
  { name: 'per gram taken for per mole', text: silver({ factor: 1 / 107.868 }), asked: ag, verdict: 'fail', checks: { scale: 'fail' }, suggestion: 'per-gram-to-per-mole' },
  { name: 'per mole taken for per gram', text: silver({ unit: 'mJ/(g K)' }), asked: ag, verdict: 'fail', checks: { scale: 'fail' }, suggestion: 'per-mole-to-per-gram' },
  { name: 'per atom taken for per formula unit', text: measuredTable({ law: sapphireLaw, fromK: 3, toK: 20, factor: 1 / 5 }), asked: { formula: 'Al2O3', kind: 'insulator' }, verdict: 'fail', checks: { scale: 'caution', handbook: 'fail' }, suggestion: 'per-atom-to-per-formula-unit' },
  { name: 'per formula unit taken for per atom', text: measuredTable({ law: sapphireLaw, fromK: 3, toK: 20, unit: 'mJ/(g-atom K)' }), asked: { formula: 'Al2O3', kind: 'insulator' }, verdict: 'fail', checks: { handbook: 'fail' }, suggestion: 'per-formula-unit-to-per-atom' },
  { name: 'calories under a head of J', text: silver({ factor: 1 / 4.184 }), asked: ag, verdict: 'fail', checks: { handbook: 'fail' }, suggestion: 'calorie-to-joule' },
  { name: 'mass typed in g for mg', text: copper({ unit: 'µJ/K', factor: MILLIMOLE_CU }), asked: { ...cu, massMg: 0.4126, windowK: WHOLE_CU }, verdict: 'fail', checks: { scale: 'fail' }, suggestion: 'mass-unit-milligram-gram' },
  { name: 'mass twice too large', text: copper({ unit: 'µJ/K', factor: MILLIMOLE_CU }), asked: { ...cu, massMg: 825.2 }, verdict: 'fail', checks: { handbook: 'fail' }, suggestion: null, says: { handbook: /0\.(49|50)\d* times the handbook curve all over the window: the mass/ } },
  { name: 'mass against dimensions', text: copper(), asked: { ...cu, massMg: 412.6, densityGPerCm3: 8.96, volumeMm3: 92 }, verdict: 'fail', checks: { mass: 'fail' } },

  // Wrong model, window or material.
  { name: 'the real oxide, plain fit', text: OXIDE, asked: { formula: 'Dy2O3', kind: 'unknown', windowK: [1.8, 14.6] }, verdict: 'fail', checks: { upturn: 'fail' }, says: { upturn: /turns up below 4\.\d+ K.*Add the A\/T² tail/ } },
  { name: 'the real oxide, window left to the advice', text: OXIDE, asked: { formula: 'Dy2O3', kind: 'insulator' }, verdict: 'fail', checks: { upturn: 'fail' } },
  { name: 'copper with a nuclear tail, plain fit', text: copper({ law: withTail }), asked: { ...cu, windowK: WHOLE_CU }, verdict: 'fail', checks: { upturn: 'fail' } },
  { name: 'a Schottky peak inside the window', text: measuredTable({ law: t => silverLaw(t) + 40 * schottkyHeatCapacity(t / 4), fromK: 1.2, toK: 4.4 }), asked: { ...ag, windowK: WHOLE_AG }, verdict: 'fail', checks: { handbook: 'fail' } },
  { name: 'transition inside the window', text: measuredTable({ law: tantalumSuperconducting, fromK: 2, toK: 8, points: 60 }), asked: { formula: 'Ta', kind: 'metal', windowK: [1.9, 8.1] }, verdict: 'fail', checks: { transition: 'fail' }, says: { transition: /drops by .* through 4\.\d+ K/ } },
  { name: 'transition at a stated T_c inside the window', text: measuredTable({ law: tantalumSuperconducting, fromK: 2, toK: 8, points: 60 }), asked: { formula: 'Ta', kind: 'superconductor', criticalTemperatureK: 4.47, windowK: [1.9, 8.1] }, verdict: 'fail', checks: { transition: 'fail' } },
  { name: 'the whole window below T_c', text: measuredTable({ law: tantalumSuperconducting, fromK: 1.5, toK: 4.3 }), asked: { formula: 'Ta', kind: 'superconductor', criticalTemperatureK: 4.47, windowK: [1.4, 4.4] }, verdict: 'fail', checks: { 'transition': 'fail', 'electronic-term': 'not-applicable' } },
  { name: 'insulator called a metal', text: measuredTable({ law: sapphireLaw, fromK: 3, toK: 20, noise: 0.01 }), asked: { formula: 'Al2O3', kind: 'metal' }, verdict: 'fail', checks: { 'electronic-term': 'fail' } },
  { name: 'metal called an insulator', text: silver(), asked: { ...ag, kind: 'insulator' }, verdict: 'fail', checks: { 'electronic-term': 'fail' } },
  { name: 'silver under the formula of copper', text: silver(), asked: { ...cu, windowK: WHOLE_AG }, verdict: 'fail', checks: { handbook: 'fail' } },
  { name: 'real silver, all of it warmer than the T³ law', text: SILVER_WARM, asked: { ...ag, windowK: [7, 20] }, verdict: 'fail', checks: { 'electronic-term': 'fail', 'debye-range': 'caution' }, suggestion: null },
  { name: 'copper up to 24 K by a plain fit', text: copper({ toK: 24 }), asked: { ...cu, windowK: [1.2, 24.1] }, verdict: 'fail', checks: { residuals: 'fail' } },

  // Points.
  { name: 'addenda left in', text: silver({ law: t => silverLaw(t) + 0.4 + 0.3 * t }), asked: { ...ag, windowK: WHOLE_AG }, verdict: 'fail', checks: { 'zero-at-zero': 'fail', 'handbook': 'fail' }, suggestion: 'addenda-forgotten' },
  { name: 'a constant left in', text: silver({ law: t => silverLaw(t) + 0.3 }), asked: { ...ag, windowK: WHOLE_AG }, verdict: 'fail', checks: { 'zero-at-zero': 'fail' } },
  { name: 'too few points', text: silver({ points: 4 }), asked: { ...ag, windowK: WHOLE_AG }, verdict: 'fail', checks: { coverage: 'fail' } },
  { name: 'few points', text: silver({ points: 8 }), asked: { ...ag, windowK: WHOLE_AG }, verdict: 'caution', checks: { coverage: 'caution' } },
  { name: 'no cold points', text: silver({ fromK: 3.9, points: 30 }), asked: { ...ag, windowK: [3.8, 4.5] }, verdict: 'fail', checks: { coverage: 'fail' } },
  { name: 'one far point', text: spoil(copper(), (cells, row) => row === 3 ? [cells[0]!, String(Number(cells[1]) * 1.06), cells[2]!] : cells), asked: { ...cu, windowK: WHOLE_CU }, verdict: 'caution', checks: { residuals: 'caution' }, says: { residuals: /one point stands far out: .*\(row 4\)/i } },
  { name: 'errors stated five times too small', text: copper({ statedNoise: 0.001 }), asked: { ...cu, windowK: WHOLE_CU }, verdict: 'fail', checks: { residuals: 'fail' } },
  { name: 'errors stated five times too large', text: copper({ statedNoise: 0.025 }), asked: { ...cu, windowK: WHOLE_CU }, verdict: 'caution', checks: { residuals: 'caution' } },
  { name: 'sweeps that disagree', text: copper() + copper({ factor: 1.12, seed: 8 }).split('\n').slice(1).reverse().join('\n'), asked: { ...cu, windowK: WHOLE_CU }, verdict: 'fail', checks: { repeat: 'fail' } },
  { name: 'NaN, negative and zero rows', text: spoil(copper(), (cells, row) => row === 5 ? [cells[0]!, 'NaN', cells[2]!] : row === 9 ? [cells[0]!, `-${cells[1]}`, cells[2]!] : row === 12 ? ['0', cells[1]!, cells[2]!] : cells), asked: cu, verdict: 'ok', rejected: 3 },
  { name: 'half of the heat capacities are words', text: spoil(copper(), (cells, row) => row % 2 === 0 ? [cells[0]!, 'bad', cells[2]!] : cells), asked: cu, verdict: 'ok', rejected: 20 },
  { name: 'addenda that swamp the sample', text: copper({ law: t => copperLaw(t) * 12, unit: 'µJ/K', factor: MILLIMOLE_CU }), asked: { ...cu, massMg: 412.6, windowK: WHOLE_CU, addenda: copper({ law: t => copperLaw(t) * 11, unit: 'µJ/K', factor: MILLIMOLE_CU, noise: 1e-6, fromK: 1.2, toK: 7 }) }, verdict: 'fail', checks: { addenda: 'fail' } },
]

describe('the fault table', () => {
  it('has more than 25 spoiled files', () => {
    expect(CASES.filter(each => each.verdict !== 'ok').length).toBeGreaterThanOrEqual(25)
    expect(new Set(CASES.map(each => each.name)).size).toBe(CASES.length)
  })

  it.each(CASES.map(each => [each.name, each.verdict, each] as const))('%s: %s', (_, verdict, { text, asked, checks = {}, suggestion, rejected, says = {} }) => {
    const report = checkText(text, asked)
    const found = statuses(report)
    const sentences = report.checks.map(check => `${check.status} ${check.id}: ${check.message}`).join('\n')
    for (const [id, status] of Object.entries(checks)) expect(found[id], `${id}\n${sentences}`).toBe(status)
    expect(report.verdict, sentences).toBe(verdict)
    if (suggestion !== undefined) expect(report.suggestions[0]?.id ?? null, JSON.stringify(report.suggestions)).toBe(suggestion)
    if (rejected !== undefined) expect(report.rejectedRows).toHaveLength(rejected)
    for (const [id, words] of Object.entries(says)) expect(report.checks.find(check => check.id === id)?.message).toMatch(words)
  })

  it.each([
    ['commas for decimals and for cells', 'T/K,C/(mJ/(mol K))\n1,83,0,143\n1,90,0,133\n', /semicolons, or with decimal points/],
    ['an empty file', '', /empty/],
    ['no heads', '1.8,0.14\n1.9,0.13\n', /has no heads/],
    ['heads without units', 'T,C\n1.8,0.14\n1.9,0.13\n', /says no unit/],
    ['a letter', 'Dear Sir,\nit was cold.\n', /no table/],
    ['J/K without a mass', 'T/K,C/(µJ/K)\n1.8,0.14\n1.9,0.13\n', /mass is needed/],
    ['only two points', 'T/K,C/(mJ/(mol K))\n1.8,0.14\n1.9,0.15\n', /2 points lie/],
  ])('%s is refused before any verdict', (_, text, sentence) => {
    expect(() => checkText(text, { formula: 'Cu' })).toThrowError(sentence)
  })
})
