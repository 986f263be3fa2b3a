/**
 * A level book as the trade reduces it: setups, rises and falls, heights of collimation, reduced levels
 * carried from the first known point, arithmetic checks, and the misclosure of every loop or line between
 * held points. No adjustment: that is adjust.ts. All in m; levels up positive.
 *
 * A setup begins at each backsight and ends before the next. A run is a chain of setups joined by change
 * points; a backsight on another point than the last foresight's begins a new run. Half-written books are
 * reduced as far as they go.
 */

export type Sight = 'back' | 'mid' | 'fore'

/** One row of the book. Lengths of sights in m. */
export interface BookLine {
  /** index of the point read */
  point: number
  back?: number
  mid?: number
  fore?: number
  /** length of the sight of the row's reading */
  sight?: number
  /** length of the backsight where the row has a foresight as well; else as `sight` */
  backSight?: number
}

export interface BookReading {
  /** index of the row */
  row: number
  setup: number
  point: number
  sight: Sight
  /** staff reading, m */
  reading: number
  /** length of the sight, m */
  length?: number
}

export interface ReducedRow {
  /** previous reading of the setup less this one, m; a fall is negative */
  rise?: number
  /** height of collimation of the setup that begins in this row, m */
  collimation?: number
  /** reduced level, carried and not adjusted, m */
  level?: number
}

/** A loop back to its point or a line between two held points. */
export interface Closure {
  from: number
  to: number
  setups: number
  /** sum of its sights, m; absent where one is not booked */
  length?: number
  /** carried level at the end less held level, m */
  misclosure: number
  /** indices of the readings on the way */
  readings: number[]
}

/** Sums over the book, m. `back - fore`, `rise - fall` and `gain` agree in a book that is reduced rightly. */
export interface BookChecks {
  back: number
  /** foresights, with the last intermediate sight of a run that ends without one */
  fore: number
  rise: number
  fall: number
  /** last reduced level less the first, summed over runs */
  gain: number
  /** intermediate and foresights and all reduced levels but the first of each run; NaN where a level is not known */
  sights: number
  /** each height of collimation times the readings taken from it; equals `sights` */
  collimations: number
}

export interface ReducedBook {
  setups: number
  readings: BookReading[]
  /** one a row of the book */
  rows: ReducedRow[]
  closures: Closure[]
  /** rows with a reading before any backsight */
  before: number[]
  checks: BookChecks
}

/**
 * Setups, readings, rises, collimations, reduced levels, checks and misclosures of a level book.
 *
 *     rise = previous reading - this reading            height of collimation = level + backsight
 *     level = height of collimation - reading           sum of back - sum of fore = last - first level
 *
 * @param lines the book's rows in booked order; readings in m, finite
 * @param held  shape (p), m: level of a held point, NaN for any other
 * @returns     see ReducedBook; levels are those carried from the run's first known point, or from the first
 *              held point met where the run begins on an unknown one, and absent where there is none
 * @source      common practice (rise and fall, height of collimation)
 */
export function reduceBook(lines: readonly BookLine[], held: ArrayLike<number>): ReducedBook {
  const { readings, setups, runs, before } = readingsOf(lines)
  const rows: ReducedRow[] = lines.map(() => ({}))
  const closures: Closure[] = []
  const checks: BookChecks = { back: 0, fore: 0, rise: 0, fall: 0, gain: 0, sights: 0, collimations: 0 }
  const carried = new Map<number, number>()
  for (const run of runs) {
    reduceRun(run, readings, held, carried, rows, checks)
    closures.push(...closuresOf(run, readings, held))
  }
  return { setups, readings, rows, closures, before, checks }
}

/** Readings in order, numbered by setup, and the runs as lists of reading indices. */
function readingsOf(lines: readonly BookLine[]) {
  const readings: BookReading[] = []
  const runs: number[][] = []
  const before: number[] = []
  let setups = 0
  let changePoint = -1
  lines.forEach((line, row) => {
    const { point } = line
    for (const sight of ['mid', 'fore', 'back'] as const) {
      const reading = line[sight]
      if (reading === undefined) continue
      if (sight === 'back') {
        setups++
        if (point !== changePoint) runs.push([])
      } else if (setups === 0) {
        before.push(row)
        continue
      }
      changePoint = sight === 'fore' ? point : -1
      const length = sight === 'back' && line.fore !== undefined ? (line.backSight ?? line.sight) : line.sight
      runs.at(-1)!.push(readings.length)
      readings.push({ row, setup: setups - 1, point, sight, reading, length })
    }
  })
  return { readings, setups, runs, before }
}

function reduceRun(
  run: readonly number[],
  readings: readonly BookReading[],
  held: ArrayLike<number>,
  carried: Map<number, number>,
  rows: ReducedRow[],
  checks: BookChecks,
): void {
  // Levels relative to the run's first point; the shift to true levels is known once a known point is met.
  const relative: number[] = []
  let collimation = 0
  let previous = 0
  let level = 0
  for (const i of run) {
    const { sight, reading, row } = readings[i]!
    if (sight === 'back') {
      collimation = level + reading
      checks.back += reading
    } else {
      const rise = previous - reading
      rows[row]!.rise = rise
      if (rise > 0) checks.rise += rise
      else checks.fall -= rise
      level = collimation - reading
      if (sight === 'fore') checks.fore += reading
    }
    previous = reading
    relative.push(level)
  }
  const last = readings[run.at(-1)!]!
  if (last.sight === 'mid') checks.fore += last.reading
  // A backsight that nothing follows yet proves nothing.
  if (last.sight === 'back') checks.back -= last.reading
  checks.gain += level

  const shift = shiftOf(run, readings, relative, held, carried)
  let collimations = 0
  let sights = 0
  run.forEach((i, k) => {
    const { sight, reading, row, point } = readings[i]!
    const at = shift + relative[k]!
    if (sight === 'back') collimation = at + reading
    else {
      sights += reading + at
      collimations += collimation
    }
    if (Number.isNaN(at)) return
    carried.set(point, at)
    rows[row]!.level = at
    if (sight === 'back') rows[row]!.collimation = collimation
  })
  checks.sights += sights
  checks.collimations += collimations
}

/** What lifts a run's relative levels to true ones; NaN where no point of it is known. */
function shiftOf(
  run: readonly number[],
  readings: readonly BookReading[],
  relative: readonly number[],
  held: ArrayLike<number>,
  carried: ReadonlyMap<number, number>,
): number {
  const first = readings[run[0]!]!.point
  if (Number.isFinite(held[first])) return held[first]!
  if (carried.has(first)) return carried.get(first)!
  for (let k = 0; k < run.length; k++) {
    const known = held[readings[run[k]!]!.point]!
    if (Number.isFinite(known)) return known - relative[k]!
  }
  return NaN
}

/** A foresight on a held point ends a loop or line and begins the next; an intermediate sight on one is a spur. */
function closuresOf(run: readonly number[], readings: readonly BookReading[], held: ArrayLike<number>): Closure[] {
  const closures: Closure[] = []
  let from = -1
  let way: number[] = []
  for (const i of run) {
    const { sight, point } = readings[i]!
    const isHeld = Number.isFinite(held[point])
    if (sight === 'back') {
      if (from < 0 && isHeld) from = point
      if (from >= 0) way.push(i)
      continue
    }
    if (from >= 0 && isHeld) closures.push(closure(from, [...way, i], readings, held))
    if (sight === 'fore') {
      if (isHeld) from = point
      way = isHeld ? [] : from >= 0 ? [...way, i] : []
    } else if (from < 0 && isHeld) {
      from = point
      way = [i]
    }
  }
  return closures
}

function closure(from: number, way: number[], readings: readonly BookReading[], held: ArrayLike<number>): Closure {
  const to = readings[way.at(-1)!]!.point
  let risen = 0
  let length: number | undefined = 0
  way.forEach((i, k) => {
    risen += (k % 2 ? -1 : 1) * readings[i]!.reading
    const sight = readings[i]!.length
    length = length === undefined || sight === undefined ? undefined : length + sight
  })
  return { from, to, setups: way.length / 2, length, misclosure: risen - (held[to]! - held[from]!), readings: way }
}
