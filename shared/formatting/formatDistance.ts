import { significantDigits } from './significantDigits'

/** A distance to -1 (a ratio): three decimals below 10, as a sounding is printed; '0.271', '1.000', '12.35'. */
export function formatDistance(distance: number): string {
  return distance >= 0.001 && distance < 10 ? distance.toFixed(3) : significantDigits(distance)
}
