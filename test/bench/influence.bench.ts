/**
 * Influence of every base of one frame line: the profile solver against ml-matrix's dense Cholesky on the same
 * problem, and how the profile solver's time grows. Only ratios within one run are worth comparing.
 */
import { CholeskyDecomposition } from 'ml-matrix'
import { baseInfluence, factorFrame } from '../../solver/index.ts'
import { denseInfluenceProblem } from '../support/dense-frame.ts'
import { arraysOf, gridFrame } from '../support/made-frames.ts'

function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  return (sorted[(sorted.length - 1) >> 1]! + sorted[sorted.length >> 1]!) / 2
}

function times(repeats: number, act: () => void): number[] {
  return Array.from({ length: repeats }, () => {
    const start = performance.now()
    act()
    return performance.now() - start
  })
}

function milliseconds(value: number): string {
  return `${value < 10 ? value.toFixed(2) : value.toFixed(1)} ms`
}

function againstDense(): string[] {
  const frame = arraysOf(gridFrame(13, 21))
  const { stiffness, sides } = denseInfluenceProblem(frame)
  const whole = (): void => void baseInfluence(factorFrame(frame))
  const cold = times(1, whole)[0]!
  times(20, whole)
  const ours: number[] = []
  const dense: number[] = []
  // In turns, so that whatever else the machine does falls on both.
  for (let round = 0; round < 5; round++) {
    ours.push(...times(8, whole))
    dense.push(...times(1, () => void new CholeskyDecomposition(stiffness).solve(sides)))
  }
  const factor = median(times(20, () => void factorFrame(frame)))
  const f = factorFrame(frame)
  const answer = median(times(20, () => void baseInfluence(f)))
  return [
    `line of 12 bays and 20 storeys: ${frame.x.length} nodes, ${frame.from.length} members, ${frame.base.length} bases, ` +
      `${f.profile.rows} unknowns`,
    `factorise and all influences, median of ${ours.length}: ${milliseconds(median(ours))} ` +
      `(first call ${milliseconds(cold)}; factorise ${milliseconds(factor)}, influences ${milliseconds(answer)})`,
    `ml-matrix dense Cholesky, matrix given, median of ${dense.length}: ${milliseconds(median(dense))}`,
    `ratio: ${(median(dense) / median(ours)).toFixed(0)} times faster`,
  ]
}

function growth(): string[] {
  const lines = ['bays x storeys   unknowns   mean row height   factorise    influences   ns per unknown x height^2']
  for (const [bays, storeys, repeats] of [
    [3, 5, 40],
    [6, 10, 40],
    [12, 20, 20],
    [20, 30, 10],
    [40, 60, 5],
  ] as const) {
    const frame = arraysOf(gridFrame(bays + 1, storeys + 1))
    const f = factorFrame(frame)
    const { rows, lower } = f.profile
    times(2, () => void baseInfluence(factorFrame(frame)))
    const factor = median(times(repeats, () => void factorFrame(frame)))
    const answer = median(times(repeats, () => void baseInfluence(f)))
    const height = lower.length / rows
    lines.push(
      `${`${bays} x ${storeys}`.padEnd(17)}${String(rows).padStart(8)}${height.toFixed(1).padStart(18)}` +
        `${milliseconds(factor).padStart(12)}${milliseconds(answer).padStart(14)}` +
        `${((factor * 1e6) / (rows * height ** 2)).toFixed(2).padStart(28)}`,
    )
  }
  return lines
}

export function run(): { name: string; lines: string[] } {
  return { name: 'influence of every base of a frame line', lines: [...againstDense(), ...growth()] }
}
