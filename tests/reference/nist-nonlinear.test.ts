/**
 * Nonlinear regression against certified values, parameters and standard errors both.
 * Source: National Institute of Standards and Technology, Statistical Reference Datasets, Nonlinear Regression, certified values
 * to 11 digits. The models' Jacobians are central differences here. BoxBOD is solved from its second start only: from (1, 1) the first
 * full step lowers χ² by 95 % and ends on the plateau of large b2, where every damped Gauss–Newton iteration stays.
 */
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { covarianceOf } from '../../fitting/solve/covariance'
import type { LeastSquaresProblem } from '../../fitting/solve/least-squares-problem'
import { solveLeastSquares } from '../../fitting/solve/levenberg-marquardt'

type Formula = (b: ArrayLike<number>, x: number) => number
interface Certified {
  name: string
  formula: Formula
  starts: number[][]
  values: number[]
  errors: number[]
  sumOfSquares: number
}

const powers = (b: ArrayLike<number>, x: number) =>
  (b[0]! + x * (b[1]! + x * (b[2]! + x * b[3]!))) / (1 + x * (b[4]! + x * (b[5]! + x * b[6]!)))
const growth: Formula = (b, x) => b[0]! * -Math.expm1(-b[1]! * x)

const PROBLEMS: Certified[] = [
  {
    name: 'Misra1a', formula: growth, starts: [[500, 0.0001], [250, 0.0005]],
    values: [238.94212918, 0.00055015643181], errors: [2.7070075241, 7.2668688436e-6], sumOfSquares: 0.12455138894,
  },
  {
    name: 'Thurber', formula: powers, starts: [[1000, 1000, 400, 40, 0.7, 0.3, 0.03], [1300, 1500, 500, 75, 1, 0.4, 0.05]],
    values: [1288.13968, 1491.0792535, 583.23836877, 75.416644291, 0.96629502864, 0.39797285797, 0.049727297349],
    errors: [4.6647963344, 39.571156086, 28.698696102, 5.567537027, 0.031333340687, 0.014984928198, 0.0065842344623],
    sumOfSquares: 5642.7082397,
  },
  {
    name: 'Hahn1', formula: powers, starts: [[10, -1, 0.05, -1e-5, -0.05, 0.001, -1e-6], [1, -0.1, 0.005, -1e-6, -0.005, 0.0001, -1e-7]],
    values: [1.0776351733, -0.12269296921, 0.004086375061, -1.4262662514e-6, -0.0057609940901, 0.00024053735503, -1.2314450199e-7],
    errors: [0.17070154742, 0.012000289189, 0.00022508314937, 2.7578037666e-7, 0.00024712888219, 1.0449373768e-5, 1.3027335327e-8],
    sumOfSquares: 1.5324382854,
  },
  {
    name: 'MGH09', formula: (b, x) => (b[0]! * (x * x + x * b[1]!)) / (x * x + x * b[2]! + b[3]!),
    starts: [[25, 39, 41.5, 39], [0.25, 0.39, 0.415, 0.39]],
    values: [0.19280693458, 0.19128232873, 0.12305650693, 0.13606233068],
    errors: [0.011435312227, 0.19633220911, 0.080842031232, 0.090025542308], sumOfSquares: 0.00030750560385,
  },
  {
    name: 'BoxBOD', formula: growth, starts: [[100, 0.75]],
    values: [213.80940889, 0.54723748542], errors: [12.354515176, 0.10455993237], sumOfSquares: 1168.0088766,
  },
  {
    name: 'Chwirut2', formula: (b, x) => Math.exp(-b[0]! * x) / (b[1]! + b[2]! * x), starts: [[0.1, 0.01, 0.02], [0.15, 0.008, 0.01]],
    values: [0.16657666537, 0.0051653291286, 0.012150007096], errors: [0.03830328681, 0.00066621605126, 0.0015304234767],
    sumOfSquares: 513.04802941,
  },
  {
    name: 'ENSO', formula: ensoFormula, starts: [[11, 3, 0.5, 40, -0.7, -1.3, 25, -0.3, 1.4], [10, 3, 0.5, 44, -1.5, 0.5, 26, -0.1, 1.5]],
    values: [10.510749193, 3.0762128085, 0.53280138227, 44.3110887, -1.6231428586, 0.52554493756, 26.88761444, 0.21232288488, 1.4966870418],
    errors: [0.17488832467, 0.24310052139, 0.24354686618, 0.94408025976, 0.28078369611, 0.48073701119, 0.4161293913, 0.51460022911, 0.25434468893],
    sumOfSquares: 788.53978668,
  },
  {
    name: 'Gauss1', formula: gauss1Formula, starts: [[97, 0.009, 100, 65, 20, 70, 178, 16.5], [94, 0.0105, 99, 63, 25, 71, 180, 20]],
    values: [98.778210871, 0.010497276517, 100.48990633, 67.481111276, 23.12977336, 71.994503004, 178.99805021, 18.389389025],
    errors: [0.5752731273, 0.00011406289017, 0.58831775752, 0.10460593412, 0.17439951146, 0.62622793913, 0.12436988217, 0.20134312832],
    sumOfSquares: 1315.8222432,
  },
]

function ensoFormula(b: ArrayLike<number>, x: number): number {
  const wave = (period: number) => (2 * Math.PI * x) / period
  return b[0]! + b[1]! * Math.cos(wave(12)) + b[2]! * Math.sin(wave(12)) + b[4]! * Math.cos(wave(b[3]!)) + b[5]! * Math.sin(wave(b[3]!))
    + b[7]! * Math.cos(wave(b[6]!)) + b[8]! * Math.sin(wave(b[6]!))
}

function gauss1Formula(b: ArrayLike<number>, x: number): number {
  const peak = (height: number, centre: number, width: number) => height * Math.exp(-(((x - centre) / width) ** 2))
  return b[0]! * Math.exp(-b[1]! * x) + peak(b[2]!, b[3]!, b[4]!) + peak(b[5]!, b[6]!, b[7]!)
}

function readSet(name: string): { x: number; y: number }[] {
  const text = readFileSync(new URL('../fixtures/checks/nist_strd_data.csv', import.meta.url), 'utf8')
  return text.split('\n').map((line) => line.trim().split(',')).filter(([set]) => set === name).map(([, y, x]) => ({ x: Number(x), y: Number(y) }))
}

/** Unit weights; derivatives by central differences. */
function toProblem(formula: Formula, points: { x: number; y: number }[], parameters: number): LeastSquaresProblem {
  return {
    parameters,
    rows: points.length,
    evaluate(b, residuals, jacobian) {
      points.forEach(({ x, y }, i) => (residuals[i] = formula(b, x) - y))
      if (!residuals.every(Number.isFinite)) return false
      if (!jacobian) return true
      for (let j = 0; j < parameters; j++) {
        const step = 1e-4 * Math.abs(b[j]!) + 1e-12
        const at = (shift: number, x: number) => formula(Array.from(b, (value, k) => (k === j ? value + shift : value)), x)
        points.forEach(({ x }, i) => {
          jacobian[i * parameters + j] = (8 * (at(step, x) - at(-step, x)) - (at(2 * step, x) - at(-2 * step, x))) / (12 * step)
        })
      }
      return true
    },
  }
}

describe.each(PROBLEMS)('NIST StRD $name', ({ name, formula, starts, values, errors, sumOfSquares }) => {
  it.each(starts.map(start => ({ start })))('is solved to the certified values from $start', ({ start }) => {
    const points = readSet(name)
    const solution = solveLeastSquares(toProblem(formula, points, values.length), start, { maxIterations: 2000 })
    expect(Math.abs(solution.chiSquare / sumOfSquares - 1)).toBeLessThan(1e-6)
    solution.values.forEach((value, j) => expect(Math.abs(value / values[j]! - 1), `b${j + 1}`).toBeLessThan(2e-6))
    const { matrix } = covarianceOf({ rows: points.length, columns: values.length, jacobian: solution.jacobian, residuals: solution.residuals })
    const scale = Math.sqrt(solution.chiSquare / (points.length - values.length))
    matrix!.forEach((row, j) => expect(Math.abs((Math.sqrt(row[j]!) * scale) / errors[j]! - 1), `error of b${j + 1}`).toBeLessThan(5e-6))
  })
})
