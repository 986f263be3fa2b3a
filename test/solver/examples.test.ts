/**
 * Runs the examples of the solver's doc comments. Under `@example` each line is `expression // value`, the value
 * being JavaScript or `throws CODE`; a line without `//` is run before those after it. A value with decimals is
 * met within half a unit of its last digit (and rounding, 1e-13 of it), one without exactly.
 */
import { globSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import * as solver from '../../solver/index.ts'

interface Example {
  place: string
  setup: string
  expression: string
  value: string
}

function examplesOf(file: string, text: string): Example[] {
  const found: Example[] = []
  for (const comment of text.matchAll(/\/\*\*[\s\S]*?\*\//g)) {
    let isExample = false
    let setup = ''
    for (const [offset, line] of comment[0].split('\n').entries()) {
      const said = line.replace(/^\s*(\/\*)?\*\/?/, '').trim()
      if (said.startsWith('@')) isExample = said === '@example'
      else if (isExample && said) {
        const cut = said.indexOf('//')
        const number = text.slice(0, comment.index).split('\n').length + offset
        if (cut < 0) setup += `${said}\n`
        else
          found.push({
            place: `${file}:${number}`,
            setup,
            expression: said.slice(0, cut).trim().replace(/;$/, ''),
            value: said.slice(cut + 2).trim(),
          })
      }
    }
  }
  return found
}

function run(setup: string, expression: string): unknown {
  const names = Object.keys(solver)
  return new Function(...names, `${setup}\nreturn (${expression})`)(...Object.values(solver))
}

/** Typed arrays as plain ones, so that only the figures are compared. */
function plain(value: unknown): unknown {
  if (ArrayBuffer.isView(value)) return Array.from(value as unknown as ArrayLike<number>)
  if (Array.isArray(value)) return value.map(plain)
  if (value && typeof value === 'object')
    return Object.fromEntries(Object.entries(value).map(([key, own]) => [key, plain(own)]))
  return value
}

/** The value written, with each figure that has decimals as one that is close enough to it. */
function written(value: string): unknown {
  const close = value.replace(
    /-?\b\d+\.(\d+)(e[+-]?\d+)?/g,
    (figure, decimals: string, power?: string) =>
      `closeTo(${figure}, ${0.5 * 10 ** (Number((power ?? 'e0').slice(1)) - decimals.length)})`,
  )
  return new Function('closeTo', `return (${close})`)((figure: number, half: number) => ({
    asymmetricMatch: (found: unknown) =>
      typeof found === 'number' && Math.abs(found - figure) <= half * (1 + 1e-9) + 1e-13 * Math.abs(figure),
    toString: () => `about ${figure}`,
  }))
}

const examples = globSync('solver/**/*.ts')
  .sort()
  .flatMap((file) => examplesOf(file, readFileSync(file, 'utf8')))

describe('the examples in the doc comments of the solver', () => {
  it.each(examples)('$place $expression', ({ setup, expression, value }) => {
    const throws = /^throws ([a-z-]+)$/.exec(value)
    if (throws) expect(() => run(setup, expression)).toThrow(expect.objectContaining({ code: throws[1] }))
    else expect(plain(run(setup, expression))).toEqual(written(value))
  })

  it('are there for the closed forms', () => {
    expect(examples.filter(({ expression }) => expression.startsWith('settlementEndMoments')).length).toBe(3)
  })
})

describe('the reader of examples', () => {
  function comment(line: string): Example {
    return examplesOf('made.ts', `/**\n * What it gives.\n * @example\n *     ${line}\n * @source none\n */`)[0]!
  }

  it('finds place, expression and value', () => {
    expect(comment('f(1) // [2, 3]')).toEqual({ place: 'made.ts:4', setup: '', expression: 'f(1)', value: '[2, 3]' })
  })

  it('holds figures to the digits written and no others', () => {
    expect([-262.4417, 3]).toEqual(written('[-262.442, 3]'))
    expect([-262.4426]).not.toEqual(written('[-262.442]'))
    expect([270.0001]).not.toEqual(written('[270]'))
    expect({ p: 1.234e-7 }).toEqual(written('{ p: 1.23e-7 }'))
  })
})
