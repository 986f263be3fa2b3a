/**
 * Quantiles of the normal, chi-square and Student distributions, to the precision of a double. What the
 * survey's tests need and no more; probabilities are of the lower tail. No units.
 */

/**
 * Value that a standard normal variable stays below with probability p.
 *
 * Rational approximations in three ranges, relative error about 1e-16.
 *
 * @param p above 0 and below 1
 * @returns NaN outside that range
 * @source  M. J. Wichura, Algorithm AS 241 (PPND16), Applied Statistics 37 (3), 1988, 477-484
 * @example
 *     normalQuantile(0.975) // 1.959963984540054
 */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) return NaN
  const q = p - 0.5
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q
    return (q * polynomial(CENTRE_OVER, r)) / polynomial(CENTRE_UNDER, r)
  }
  const tail = Math.sqrt(-Math.log(q < 0 ? p : 1 - p))
  const near = tail <= 5
  const r = near ? tail - 1.6 : tail - 5
  const size = polynomial(near ? NEAR_OVER : FAR_OVER, r) / polynomial(near ? NEAR_UNDER : FAR_UNDER, r)
  return q < 0 ? -size : size
}

/**
 * Value that a chi-square variable of f degrees of freedom stays below with probability p.
 *
 * Root of the regularised incomplete gamma function P(f / 2, x / 2) by Newton's steps inside a bracket.
 *
 * @param p above 0 and below 1
 * @param f degrees of freedom, above 0
 * @returns NaN outside these ranges
 * @source  start: E. B. Wilson and M. M. Hilferty, Proc. Nat. Acad. Sci. 17, 1931, 684-688;
 *          M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions, 1964, 26.4, 6.5
 * @example
 *     chiSquareQuantile(0.95, 3) // 7.814727903251179
 */
export function chiSquareQuantile(p: number, f: number): number {
  if (!(p > 0 && p < 1 && f > 0 && f < Infinity)) return NaN
  const a = f / 2
  const h = 2 / (9 * f)
  const guess = f * (1 - h + normalQuantile(p) * Math.sqrt(h)) ** 3
  const small = Math.exp((Math.log(p) + logGamma(a + 1)) / a) * 2
  return root(
    guess > 0 ? guess : small,
    (x) => {
      const [below, above] = gammaTails(a, x / 2)
      return p < 0.5 ? below - p : 1 - p - above
    },
    (x) => Math.exp((a - 1) * Math.log(x / 2) - x / 2 - logGamma(a)) / 2,
  )
}

/**
 * Value that Student's t of f degrees of freedom stays below with probability p.
 *
 * @param p above 0 and below 1
 * @param f degrees of freedom, above 0
 * @returns NaN outside these ranges
 * @source  M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions, 1964, 26.7.1
 * @example
 *     studentQuantile(0.975, 38) // 2.024394163911969
 */
export function studentQuantile(p: number, f: number): number {
  if (!(p > 0 && p < 1 && f > 0 && f < Infinity)) return NaN
  if (p === 0.5) return 0
  const tail = Math.min(p, 1 - p)
  const density = Math.exp(logGamma((f + 1) / 2) - logGamma(f / 2)) / Math.sqrt(f * Math.PI)
  const size = root(
    Math.max(-normalQuantile(tail), 1e-3),
    (t) => tail - betaTail(f / 2, 0.5, f / (f + t * t)) / 2,
    (t) => density * (1 + (t * t) / f) ** (-(f + 1) / 2),
  )
  return p < 0.5 ? -size : size
}

/** Root above 0 of a rising function by Newton's steps, halving the bracket where a step leaves it. */
function root(start: number, miss: (x: number) => number, slope: (x: number) => number): number {
  let low = 0
  let high = Infinity
  let x = start
  for (let step = 0; step < 200; step++) {
    const d = miss(x)
    if (d === 0) return x
    if (d < 0) low = x
    else high = x
    let next = x - d / slope(x)
    if (!(next > low && next < high)) next = high === Infinity ? 2 * x : (low + high) / 2
    if (Math.abs(next - x) <= 2e-16 * x) return next
    x = next
  }
  return x
}

/**
 * Natural logarithm of the gamma function.
 *
 * @source C. Lanczos, SIAM J. Num. Anal. 1, 1964, 86-96; coefficients for g = 607 / 128 by P. Godfrey, 2001
 */
export function logGamma(x: number): number {
  let sum = LANCZOS[0]!
  for (let i = 1; i < LANCZOS.length; i++) sum += LANCZOS[i]! / (x + i - 1)
  const t = x - 1 + 607 / 128 + 0.5
  return 0.5 * Math.log(2 * Math.PI) + (x - 0.5) * Math.log(t) - t + Math.log(sum)
}

/** Lower and upper regularised incomplete gamma: series below a + 1, continued fraction above. */
function gammaTails(a: number, x: number): [number, number] {
  if (x <= 0) return [0, 1]
  const front = Math.exp(a * Math.log(x) - x - logGamma(a))
  if (x < a + 1) {
    let term = 1 / a
    let sum = term
    for (let n = 1; n < 10_000 && term > sum * 1e-17; n++) sum += term *= x / (a + n)
    return [front * sum, 1 - front * sum]
  }
  const above = front * fraction(x + 1 - a, (n) => [-n * (n - a), x + 1 - a + 2 * n])
  return [1 - above, above]
}

/** Regularised incomplete beta function I_x(a, b). */
function betaTail(a: number, b: number, x: number): number {
  if (x <= 0) return 0
  if (x >= 1) return 1
  if (x > (a + 1) / (a + b + 2)) return 1 - betaTail(b, a, 1 - x)
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x)) / a
  function step(n: number): [number, number] {
    const m = n >> 1
    if (n % 2) return [(-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1)), 1]
    return [(m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m)), 1]
  }
  return front * fraction(1, step)
}

/** 1 / (b0 + a1 / (b1 + a2 / (b2 + ...))) by Lentz's method. */
function fraction(b0: number, step: (n: number) => [number, number]): number {
  const tiny = 1e-300
  let c = 1 / tiny
  let d = 1 / (b0 || tiny)
  let value = d
  for (let n = 1; n < 10_000; n++) {
    const [a, b] = step(n)
    d = 1 / (b + a * d || tiny)
    c = b + a / c || tiny
    value *= c * d
    if (Math.abs(c * d - 1) < 1e-16) break
  }
  return value
}

function polynomial(coefficients: readonly number[], x: number): number {
  let sum = 0
  for (let i = coefficients.length - 1; i >= 0; i--) sum = sum * x + coefficients[i]!
  return sum
}

const CENTRE_OVER = [
  3.387132872796366608, 133.14166789178437745, 1971.5909503065514427, 13731.693765509461125, 45921.953931549871457,
  67265.770927008700853, 33430.575583588128105, 2509.0809287301226727,
]
const CENTRE_UNDER = [
  1, 42.313330701600911252, 687.1870074920579083, 5394.1960214247511077, 21213.794301586595867, 39307.89580009271061,
  28729.085735721942674, 5226.495278852854561,
]
const NEAR_OVER = [
  1.42343711074968357734, 4.6303378461565452959, 5.7694972214606914055, 3.64784832476320460504, 1.27045825245236838258,
  0.24178072517745061177, 0.0227238449892691845833, 7.7454501427834140764e-4,
]
const NEAR_UNDER = [
  1, 2.05319162663775882187, 1.6763848301838038494, 0.68976733498510000455, 0.14810397642748007459,
  0.0151986665636164571966, 5.475938084995344946e-4, 1.05075007164441684324e-9,
]
const FAR_OVER = [
  6.6579046435011037772, 5.4637849111641143699, 1.7848265399172913358, 0.29656057182850489123, 0.026532189526576123093,
  0.0012426609473880784386, 2.71155556874348757815e-5, 2.01033439929228813265e-7,
]
const FAR_UNDER = [
  1, 0.59983220655588793769, 0.13692988092273580531, 0.0148753612908506148525, 7.868691311456132591e-4,
  1.8463183175100546818e-5, 1.4215117583164458887e-7, 2.04426310338993978564e-15,
]
const LANCZOS = [
  0.99999999999999709182, 57.156235665862923517, -59.597960355475491248, 14.136097974741747174, -0.49191381609762019978,
  0.33994649984811888699e-4, 0.46523628927048575665e-4, -0.98374475304879564677e-4, 0.15808870322491248884e-3,
  -0.21026444172410488319e-3, 0.2174396181152126432e-3, -0.16431810653676389022e-3, 0.84418223983852743293e-4,
  -0.2619083840158140867e-4, 0.36899182659531622704e-5,
]
