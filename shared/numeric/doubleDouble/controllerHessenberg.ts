import { DoubleDoubleMatrix } from './DoubleDoubleMatrix'

/** Q'AQ upper Hessenberg, Q'b = beta e1, CQ with Q orthogonal; an entry below the diagonal that rounding hides is exactly 0. */
export interface ControllerHessenberg {
  h: DoubleDoubleMatrix
  c: DoubleDoubleMatrix
  beta: { high: number, low: number }
  /** Rows at which a diagonal block of H with no zero below its diagonal starts, and its size last; the first is the reachable part where beta is not 0. */
  starts: number[]
}

/** Part of the norm below which a column counts as zero: 2^-78, about 3e-24. The reduction's own rounding, 1e-31, grows where the states before it are nearly dependent. */
const NEGLIGIBLE = 2 ** -78
const SPLITTER = 134217729

/**
 * Reduces a system of one input to controller-Hessenberg form by reflections in double-double arithmetic (A. S. Householder 1958; G. H. Golub, C. F. Van Loan,
 * 'Matrix Computations', 1996, 7.4; P. Van Dooren, 'The generalized eigenstructure problem in linear system theory', IEEE Trans. Automatic Control 26, 1981).
 * The result is exact for matrices within about 60 n 2^-104 of the norm of those given.
 */
export function controllerHessenberg(a: DoubleDoubleMatrix, b: DoubleDoubleMatrix, c: DoubleDoubleMatrix): ControllerHessenberg {
  const n = a.rows
  const width = n + 1
  // [b A], so that the first reflection is one like the others
  const m = new DoubleDoubleMatrix(n, width)
  for (let i = 0; i < n; i++) {
    m.high[i * width] = b.high[i]!
    m.low[i * width] = b.low[i]!
    m.high.set(a.high.subarray(i * n, (i + 1) * n), i * width + 1)
    m.low.set(a.low.subarray(i * n, (i + 1) * n), i * width + 1)
  }
  const out = c.copy()
  const sizeOfA = norm(a.high)
  const sizeOfB = norm(b.high)
  const vHigh = new Float64Array(n)
  const vLow = new Float64Array(n)
  const wHigh = new Float64Array(width)
  const wLow = new Float64Array(width)
  const pair = new Float64Array(2)
  const starts = [0]
  for (let k = 0; k < n; k++) {
    let rest = 0
    for (let i = k; i < n; i++) rest += m.high[i * width + k]! ** 2
    if (Math.sqrt(rest) <= NEGLIGIBLE * (k === 0 ? sizeOfB : sizeOfA)) {
      for (let i = k; i < n; i++) {
        m.high[i * width + k] = 0
        m.low[i * width + k] = 0
      }
      if (k > 0) starts.push(k)
      continue
    }
    let below = 0
    for (let i = k + 1; i < n; i++) below += Math.abs(m.high[i * width + k]!)
    if (below === 0) continue
    // v = x + sign(x1) |x| e1, scaled so that 2 / v'v is exact enough
    for (let i = k; i < n; i++) {
      vHigh[i] = m.high[i * width + k]!
      vLow[i] = m.low[i * width + k]!
    }
    dot(vHigh, vLow, k, vHigh, vLow, k, n - k, pair)
    squareRoot(pair)
    const sign = vHigh[k]! < 0 ? -1 : 1
    const lengthHigh = sign * pair[0]!
    const lengthLow = sign * pair[1]!
    addTo(vHigh, vLow, k, lengthHigh, lengthLow)
    dot(vHigh, vLow, k, vHigh, vLow, k, n - k, pair)
    divideInto(2, 0, pair)
    const factorHigh = pair[0]!
    const factorLow = pair[1]!
    m.high[k * width + k] = -lengthHigh
    m.low[k * width + k] = -lengthLow
    for (let i = k + 1; i < n; i++) {
      m.high[i * width + k] = 0
      m.low[i * width + k] = 0
    }
    // from the left: rows k.., columns k + 1..
    const span = width - k - 1
    wHigh.fill(0)
    wLow.fill(0)
    for (let i = k; i < n; i++) addMultiple(wHigh, wLow, 0, m.high, m.low, i * width + k + 1, span, vHigh[i]!, vLow[i]!)
    scaleRange(wHigh, wLow, span, -factorHigh, -factorLow)
    for (let i = k; i < n; i++) addMultiple(m.high, m.low, i * width + k + 1, wHigh, wLow, 0, span, vHigh[i]!, vLow[i]!)
    // from the right: states k.., that is columns k + 1 of [b A]
    const reflectRow = (high: Float64Array, low: Float64Array, start: number) => {
      dot(high, low, start, vHigh, vLow, k, n - k, pair)
      timesInto(-factorHigh, -factorLow, pair)
      addMultiple(high, low, start, vHigh, vLow, k, n - k, pair[0]!, pair[1]!)
    }
    for (let i = 0; i < n; i++) reflectRow(m.high, m.low, i * width + k + 1)
    for (let i = 0; i < c.rows; i++) reflectRow(out.high, out.low, i * n + k)
  }
  return {
    h: m.part(0, n, 1, width),
    c: out,
    beta: { high: n > 0 ? m.high[0]! : 0, low: n > 0 ? m.low[0]! : 0 },
    starts: n > 0 ? [...starts, n] : [0],
  }
}

function norm(values: Float64Array): number {
  let sum = 0
  for (let k = 0; k < values.length; k++) sum += values[k]! * values[k]!
  return Math.sqrt(sum)
}

/** y += a x over `count` entries. */
function addMultiple(yHigh: Float64Array, yLow: Float64Array, yStart: number, xHigh: Float64Array, xLow: Float64Array, xStart: number, count: number, a: number, aLow: number): void {
  if (a === 0) return
  let t = SPLITTER * a
  const aTop = t - (t - a)
  const aEnd = a - aTop
  for (let k = 0; k < count; k++) {
    const b = xHigh[xStart + k]!
    t = SPLITTER * b
    const bTop = t - (t - b)
    const bEnd = b - bTop
    const p = a * b
    const e = ((aTop * bTop - p) + aTop * bEnd + aEnd * bTop) + aEnd * bEnd + (a * xLow[xStart + k]! + aLow * b)
    const c = yHigh[yStart + k]!
    const s = c + p
    const v = s - c
    const rest = (c - (s - v)) + (p - v) + (yLow[yStart + k]! + e)
    const sum = s + rest
    yHigh[yStart + k] = sum
    yLow[yStart + k] = rest - (sum - s)
  }
}

function dot(xHigh: Float64Array, xLow: Float64Array, xStart: number, yHigh: Float64Array, yLow: Float64Array, yStart: number, count: number, out: Float64Array): void {
  let high = 0
  let low = 0
  for (let k = 0; k < count; k++) {
    const a = xHigh[xStart + k]!
    const b = yHigh[yStart + k]!
    let t = SPLITTER * a
    const aTop = t - (t - a)
    const aEnd = a - aTop
    t = SPLITTER * b
    const bTop = t - (t - b)
    const bEnd = b - bTop
    const p = a * b
    const e = ((aTop * bTop - p) + aTop * bEnd + aEnd * bTop) + aEnd * bEnd + (a * yLow[yStart + k]! + xLow[xStart + k]! * b)
    const s = high + p
    const v = s - high
    low += (high - (s - v)) + (p - v) + e
    high = s
  }
  const sum = high + low
  out[0] = sum
  out[1] = low - (sum - high)
}

function addTo(high: Float64Array, low: Float64Array, k: number, a: number, aLow: number): void {
  const b = high[k]!
  const s = a + b
  const v = s - a
  const rest = (a - (s - v)) + (b - v) + (aLow + low[k]!)
  high[k] = s + rest
  low[k] = rest - (high[k]! - s)
}

/** out = (a + aLow) out */
function timesInto(a: number, aLow: number, out: Float64Array): void {
  const b = out[0]!
  let t = SPLITTER * a
  const aTop = t - (t - a)
  const aEnd = a - aTop
  t = SPLITTER * b
  const bTop = t - (t - b)
  const bEnd = b - bTop
  const p = a * b
  const e = ((aTop * bTop - p) + aTop * bEnd + aEnd * bTop) + aEnd * bEnd + (a * out[1]! + aLow * b)
  out[0] = p + e
  out[1] = e - (out[0] - p)
}

function scaleRange(high: Float64Array, low: Float64Array, count: number, a: number, aLow: number): void {
  const pair = new Float64Array(2)
  for (let k = 0; k < count; k++) {
    pair[0] = high[k]!
    pair[1] = low[k]!
    timesInto(a, aLow, pair)
    high[k] = pair[0]
    low[k] = pair[1]
  }
}

/** out = (a + aLow) / out, by two steps of division with remainder */
function divideInto(a: number, aLow: number, out: Float64Array): void {
  const quotient = a / out[0]!
  const product = new Float64Array([out[0]!, out[1]!])
  timesInto(quotient, 0, product)
  const rest = (a - product[0]!) + (aLow - product[1]!)
  const correction = rest / out[0]!
  out[0] = quotient + correction
  out[1] = correction - (out[0] - quotient)
}

/** out = sqrt(out), by one step of Heron's rule from the square root in doubles */
function squareRoot(out: Float64Array): void {
  const root = Math.sqrt(out[0]!)
  const square = new Float64Array([root, 0])
  timesInto(root, 0, square)
  const rest = (out[0]! - square[0]!) + (out[1]! - square[1]!)
  const correction = rest / (2 * root)
  out[0] = root + correction
  out[1] = correction - (out[0] - root)
}
