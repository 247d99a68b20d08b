/** Complex numbers as pairs, for the references of these tests. */
export type Complex = [number, number]
export const plus = ([a, b]: Complex, [c, d]: Complex): Complex => [a + c, b + d]
export const minus = ([a, b]: Complex, [c, d]: Complex): Complex => [a - c, b - d]
export const times = ([a, b]: Complex, [c, d]: Complex): Complex => [a * c - b * d, a * d + b * c]
export const over = ([a, b]: Complex, [c, d]: Complex): Complex => [(a * c + b * d) / (c * c + d * d), (b * c - a * d) / (c * c + d * d)]
export const exponential = ([a, b]: Complex): Complex => [Math.exp(a) * Math.cos(b), Math.exp(a) * Math.sin(b)]
export const size = ([a, b]: Complex) => Math.hypot(a, b)
