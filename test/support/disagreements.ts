/** Findings against expected ones made apart from this project. For tests. */

/** Values that are zero by theory are rounding noise on both sides: far below anything that can be measured or matters. */
const FLOOR: Record<string, number> = { kNm: 1e-9, kN: 1e-9, mm: 1e-9, rad: 1e-12, m: 1e-12 }

/** Where found does not agree with expected; lists are matched by the id of their entries. */
export function disagreements(found: unknown, expected: unknown, tolerance: number, path = ''): string[] {
  if (Array.isArray(expected))
    return expected.flatMap((item, i) => {
      const id = idOf(item)
      const own = id === undefined ? (found as unknown[])?.[i] : (found as unknown[])?.find((x) => idOf(x) === id)
      return disagreements(own, item, tolerance, `${path}[${id ?? i}]`)
    })
  if (typeof expected === 'object' && expected !== null)
    return Object.entries(expected).flatMap(([key, value]) =>
      disagreements((found as Record<string, unknown> | undefined)?.[key], value, tolerance, `${path}.${key}`),
    )
  if (typeof expected === 'number') {
    const floor = FLOOR[/_(kNm|kN|mm|rad|m)$/.exec(path)?.[1] ?? ''] ?? 1e-12
    const agrees =
      typeof found === 'number' && Math.abs(found - expected) <= Math.max(tolerance * Math.abs(expected), floor)
    return agrees ? [] : [`${path}: expected ${expected}, found ${String(found)}`]
  }
  return found === expected ? [] : [`${path}: expected ${String(expected)}, found ${String(found)}`]
}

function idOf(item: unknown): string | undefined {
  if (typeof item !== 'object' || item === null) return undefined
  const it = item as Record<string, string>
  if (it.from !== undefined) return `${it.from}-${it.to}`
  return it.id ?? it.point ?? it.support ?? it.member ?? it.node
}
