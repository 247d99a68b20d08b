/** The figure of a formatted quantity, for columns whose head carries the unit: '12.4' of '12.4 dB'. */
export const withoutUnit = (formatted: string): string => formatted.split(' ')[0] ?? formatted
