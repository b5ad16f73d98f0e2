import { spawnSync } from 'node:child_process'
import { describe, expect, it } from 'vitest'
import { debyeHeatCapacity } from '#shared/heat-capacity/debye'
import { fitLowTemperature } from '#shared/heat-capacity/fit'
import { fitNonlinear } from '#shared/heat-capacity/nonlinear'
import { TERM_POWER } from '#shared/heat-capacity/terms'
import type { FitTerm } from '#shared/heat-capacity/types'
import { relativeDifference } from '../support/reference-data'
import { seededRandom } from '../support/random'

/** Debian's Python with numpy and scipy: the second implementation. */
const PYTHON = '/usr/bin/python3'
const present = spawnSync(PYTHON, ['-c', 'import numpy, scipy.linalg, scipy.optimize, scipy.integrate']).status === 0
const why = present ? '' : ' (left out: Debian\'s python3 with numpy and scipy is not on this machine)'

/** Weighted least squares by the singular values of the column-scaled matrix, and Debye by quadrature with Θ by least_squares. */
const PROGRAM = `
import json, sys
import numpy as np
from scipy import linalg, integrate, optimize
given = json.load(sys.stdin)
linear = []
for p in given["linear"]:
    T, C, s = (np.array(p[k], dtype=float) for k in ("T", "C", "s"))
    X = np.column_stack([T ** n for n in p["powers"]]) / s[:, None]
    scale = np.linalg.norm(X, axis=0)
    u, w, vt = linalg.svd(X / scale, full_matrices=False)
    b = vt.T @ ((u.T @ (C / s)) / w) / scale
    cov = (vt.T / w ** 2) @ vt / np.outer(scale, scale)
    r = C / s - X @ b
    linear.append({"beta": b.tolist(), "cov": cov.tolist(), "chi2": float(r @ r), "condition": float(w[0] / w[-1])})
def debye(t):
    f = lambda x: x ** 4 * np.exp(-x) / np.expm1(-x) ** 2 if x > 0 else 0.0
    return 3 * t ** 3 * integrate.quad(f, 0, min(1 / t, 700), epsabs=0, epsrel=1e-13, limit=200)[0]
lattice = []
for p in given["lattice"]:
    T, C = np.array(p["T"]), np.array(p["C"])
    r = optimize.least_squares(lambda q: np.array([q[1] * debye(t / q[0]) for t in T]) - C, p["start"], method="lm", x_scale=np.abs(p["start"]), xtol=1e-15, ftol=1e-15, gtol=1e-15)
    lattice.append({"x": r.x.tolist(), "cost": float(2 * r.cost)})
json.dump({"linear": linear, "lattice": lattice}, sys.stdout)
`

interface Answer {
  linear: { beta: number[], cov: number[][], chi2: number, condition: number }[]
  lattice: { x: number[], cost: number }[]
}

const SETS: FitTerm[][] = [['gamma', 'beta3'], ['gamma', 'beta3', 'beta5'], ['tail', 'gamma', 'beta3'], ['gamma', 'beta3', 'beta5', 'tail'], ['constant', 'gamma', 'beta3']]

/** 200 problems as they come: 10 to 400 points, 0.5 to 20 K, errors from 0.1 to 5 %, coefficients over orders of magnitude. */
function linearProblems() {
  const random = seededRandom(200)
  return Array.from({ length: 200 }, (_, index) => {
    const terms = SETS[index % SETS.length]!
    const low = 0.5 + 2 * random.next()
    const high = low + 2 + 15 * random.next()
    const count = 10 + Math.floor(390 * random.next())
    const T = Array.from({ length: count }, () => low + (high - low) * random.next())
    const gamma = 10 ** (4 * random.next() - 1)
    const beta3 = 10 ** (3 * random.next() - 2)
    const share = 10 ** (-3 + 1.7 * random.next())
    const truth = T.map(t => gamma * t + beta3 * t ** 3 + (index % 3 === 0 ? 5 / t ** 2 : 0))
    const s = truth.map(value => value * share * (0.5 + random.next()))
    return { terms, powers: terms.map(term => TERM_POWER[term]), T, C: truth.map((value, i) => value + s[i]! * random.normal()), s }
  })
}

function latticeProblems() {
  const random = seededRandom(12)
  return Array.from({ length: 12 }, () => {
    const theta = 100 + 500 * random.next()
    const T = Array.from({ length: 25 }, (_, i) => 5 + 12 * i)
    return { T, C: T.map(t => 24.9 * debyeHeatCapacity(t / theta) + 0.1 * random.normal()), start: [theta * 1.2, 20] }
  })
}

describe(`a second implementation${why}`, () => {
  const linear = linearProblems()
  const lattice = latticeProblems()
  const answer = present
    ? JSON.parse(spawnSync(PYTHON, ['-c', PROGRAM], { input: JSON.stringify({ linear, lattice }), encoding: 'utf8', maxBuffer: 1 << 26 }).stdout) as Answer
    : undefined

  it.skipIf(!present)('numpy and scipy agree on 200 random fits to 1e-9', () => {
    expect(answer!.linear).toHaveLength(200)
    linear.forEach(({ terms, T, C, s }, index) => {
      const theirs = answer!.linear[index]!
      const fit = fitLowTemperature({ temperatureK: T, heatCapacity: C, sigma: s }, { terms, windowK: [0, 100] }, { atomsPerFormulaUnit: 1 })
      terms.forEach((term, j) => {
        const { value, standardError } = fit.coefficients[term]!
        expect(relativeDifference(value, theirs.beta[j]!), `${term} of problem ${index}`).toBeLessThan(1e-9)
        expect(relativeDifference(standardError, Math.sqrt(theirs.cov[j]![j]!)), `error of ${term}, problem ${index}`).toBeLessThan(1e-9)
        terms.forEach((_, k) => expect(relativeDifference(fit.covariance[j]![k]!, theirs.cov[j]![k]!)).toBeLessThan(1e-9))
      })
      expect(relativeDifference(fit.chiSquared, theirs.chi2)).toBeLessThan(1e-9)
    })
  })

  it.skipIf(!present)('scipy finds the same Debye temperatures, with its own quadrature and its own descent', () => {
    lattice.forEach(({ T, C, start }, index) => {
      const theirs = answer!.lattice[index]!
      const fit = fitNonlinear({ evaluate: ([theta, height]) => T.map(t => height! * debyeHeatCapacity(t / theta!)), values: C, start, positive: [true, true] })
      expect(relativeDifference(fit.coefficients[0]!, theirs.x[0]!), `problem ${index}`).toBeLessThan(1e-7)
      expect(relativeDifference(fit.coefficients[1]!, theirs.x[1]!)).toBeLessThan(1e-7)
      expect(relativeDifference(fit.chiSquared, theirs.cost)).toBeLessThan(1e-9)
    })
  })
})
