/**
 * JSON as RFC 8259 has it, read by our own hand for three things that JSON.parse does not give: the line and
 * column of a slip with what was expected there, keys that stand twice in one object (JSON.parse silently keeps
 * the last), and a depth that ends in a fault instead of an overflowing stack. `NaN`, `Infinity` and numbers too
 * large to hold are let through as such: the reader of the value names them by their path.
 */

export interface JsonText {
  value: unknown
  /** Keys that stand twice, in order, with what stands there the second time. */
  repeated: { path: string; value: unknown }[]
}

/** A slip in the text, counted from 1. */
export interface JsonSlip {
  line: number
  column: number
  /** What would have fitted there. */
  expected: string
  /** What stands there. */
  found: string
  /** The text ends where more was to come. */
  cut: boolean
  deep: boolean
}

/** Much deeper than any building; far from what the stack holds. */
export const DEEPEST = 64
const MOST_REPEATED = 1000

/** The value of a JSON text, or the slip that keeps it from being JSON. */
export function parseJson(text: string): { json: JsonText } | { slip: JsonSlip } {
  const reader = new Reader(text)
  try {
    return { json: reader.whole() }
  } catch (error) {
    if (error instanceof Slip) return { slip: reader.slip(error) }
    throw error
  }
}

/** A step of a path as it is written after its parent's: `.key`, or `["odd key"]`. */
export function pathStep(parent: string, key: string): string {
  if (!/^[A-Za-z_$][\w$]{0,79}$/.test(key)) {
    const short = key.length > 80 ? `${key.slice(0, 77)}...` : key
    return `${parent}[${JSON.stringify(short)}]`
  }
  return parent === '' ? key : `${parent}.${key}`
}

class Slip extends Error {
  readonly at: number
  readonly expected: string
  readonly deep: boolean
  readonly unclosed: boolean

  constructor(at: number, expected: string, why?: 'deep' | 'unclosed') {
    super(expected)
    this.at = at
    this.expected = expected
    this.deep = why === 'deep'
    this.unclosed = why === 'unclosed'
  }
}

const NUMBER = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y
const WORDS: readonly [string, unknown][] = [
  ['true', true],
  ['false', false],
  ['null', null],
  ['NaN', NaN],
  ['Infinity', Infinity],
  ['-Infinity', -Infinity],
]
const ESCAPES: Record<string, string> = {
  '"': '"',
  '\\': '\\',
  '/': '/',
  b: '\b',
  f: '\f',
  n: '\n',
  r: '\r',
  t: '\t',
}

class Reader {
  private readonly text: string
  private at = 0
  private readonly steps: (string | number)[] = []
  private readonly repeated: JsonText['repeated'] = []

  constructor(text: string) {
    this.text = text
  }

  whole(): JsonText {
    const value = this.value()
    this.skipBlanks()
    if (this.at < this.text.length) throw new Slip(this.at, 'the end of the file')
    return { value, repeated: this.repeated }
  }

  slip({ at, expected, unclosed, deep }: Slip): JsonSlip {
    const before = this.text.slice(0, at)
    const line = before.split('\n').length
    const column = at - before.lastIndexOf('\n')
    const rest = /^[^\s,:[\]{}]{1,20}|^\S/u.exec(this.text.slice(at, at + 24))
    const ended = this.text.slice(at).trim() === ''
    const found = rest?.[0] ?? (ended ? 'the end' : 'a blank')
    return { line, column, expected, found, cut: ended || unclosed, deep }
  }

  private skipBlanks(): void {
    for (;;) {
      const code = this.text.charCodeAt(this.at)
      if (code !== 32 && code !== 10 && code !== 13 && code !== 9) return
      this.at += 1
    }
  }

  private value(): unknown {
    this.skipBlanks()
    const code = this.text.charCodeAt(this.at)
    if (code === 0x7b) return this.object()
    if (code === 0x5b) return this.list()
    if (code === 0x22) return this.string()
    for (const [word, value] of WORDS) {
      if (!this.text.startsWith(word, this.at)) continue
      this.at += word.length
      return value
    }
    return this.number()
  }

  private number(): number {
    NUMBER.lastIndex = this.at
    const match = NUMBER.exec(this.text)
    if (!match) throw new Slip(this.at, 'a value')
    const end = this.at + match[0].length
    if (/[\w.+]/.test(this.text[end] ?? '')) throw new Slip(this.at, 'a number as JSON writes it')
    this.at = end
    return Number(match[0])
  }

  private enter(): void {
    if (this.steps.length >= DEEPEST) throw new Slip(this.at, 'fewer brackets inside each other', 'deep')
    this.at += 1
    this.skipBlanks()
  }

  private list(): unknown[] {
    this.enter()
    const list: unknown[] = []
    if (this.takes(']')) return list
    this.steps.push(0)
    for (;;) {
      this.steps[this.steps.length - 1] = list.length
      list.push(this.value())
      this.skipBlanks()
      if (this.takes(']')) break
      if (!this.takes(',')) throw new Slip(this.at, 'a comma or ]')
    }
    this.steps.pop()
    return list
  }

  private object(): Record<string, unknown> {
    this.enter()
    const object: Record<string, unknown> = {}
    if (this.takes('}')) return object
    this.steps.push('')
    for (;;) {
      this.skipBlanks()
      if (this.text[this.at] !== '"') throw new Slip(this.at, 'a key in double quotes')
      const key = this.string()
      this.steps[this.steps.length - 1] = key
      const again = Object.hasOwn(object, key) && this.repeated.length < MOST_REPEATED ? this.path() : undefined
      this.skipBlanks()
      if (!this.takes(':')) throw new Slip(this.at, 'a colon')
      const value = this.value()
      if (again !== undefined) this.repeated.push({ path: again, value })
      if (key === '__proto__')
        Object.defineProperty(object, key, { value, enumerable: true, configurable: true, writable: true })
      else object[key] = value
      this.skipBlanks()
      if (this.takes('}')) break
      if (!this.takes(',')) throw new Slip(this.at, 'a comma or }')
    }
    this.steps.pop()
    return object
  }

  private string(): string {
    const start = this.at
    let from = start + 1
    let read = ''
    for (let i = from; ; i++) {
      const code = this.text.charCodeAt(i)
      if (code === 0x22) {
        this.at = i + 1
        return read + this.text.slice(from, i)
      }
      if (Number.isNaN(code)) throw new Slip(start, 'a closing quote', 'unclosed')
      if (code < 32) throw new Slip(i, 'a closing quote on the same line')
      if (code !== 0x5c) continue
      const sign = this.text[i + 1] ?? ''
      const hex = sign === 'u' ? /^[\da-fA-F]{4}/.exec(this.text.slice(i + 2, i + 6)) : null
      const meant = hex ? String.fromCharCode(parseInt(hex[0], 16)) : ESCAPES[sign]
      if (meant === undefined) throw new Slip(i, 'an escape that JSON knows')
      read += this.text.slice(from, i) + meant
      i += hex ? 5 : 1
      from = i + 1
    }
  }

  private takes(sign: string): boolean {
    if (this.text[this.at] !== sign) return false
    this.at += 1
    return true
  }

  private path(): string {
    return this.steps.reduce<string>(
      (path, step) => (typeof step === 'number' ? `${path}[${step}]` : pathStep(path, step)),
      '',
    )
  }
}
