import { significantDigits } from '../../formatting/significantDigits'

/** Approaches further off than this are marked, but not numbered: there is hardly any loop gain. */
export const plainDistance = 0.97

/** A distance to -1 as short as it is printed beside a mark: '0.44', '0.083', '4.1e-5'. */
export function formatSounding(distance: number): string {
  return distance < 0.0995 ? significantDigits(distance, 2) : distance.toFixed(2)
}
