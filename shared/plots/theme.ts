/** The art direction as data: every colour, size and stroke a figure uses. */
export interface PlotTheme {
  name: 'screen' | 'print' | 'greyscale'
  paper: string
  /** text, curves */
  ink: string
  /** secondary text; only on paper, buff and the two lighter shoals */
  slate: string
  /** hairlines */
  rule: string
  /** gain above one */
  buff: string
  /** tints, the third nearest -1 */
  shoal: readonly [string, string, string]
  /** line of a row of the crossing chart */
  channel: string
  /** phase crossovers */
  sea: string
  /** closest approach, selection */
  magenta: string
  met: string
  unmet: string
  unshown: string
  fontFamily: string
  /** px */
  size: { tick: number, label: number, strong: number }
  /** px */
  stroke: { hair: number, axis: number, curve: number, mark: number }
}

const fontFamily = '\'Noto Sans\', sans-serif'

const screen: PlotTheme = {
  name: 'screen',
  paper: '#FBFAF6',
  ink: '#13233F',
  slate: '#51607A',
  rule: '#DAD7CC',
  buff: '#F2E8CF',
  shoal: ['#E3F0F6', '#C6E1EE', '#9CCBE2'],
  channel: '#9CCBE2',
  sea: '#0C5A7D',
  magenta: '#A3195B',
  met: '#1B6E4B',
  unmet: '#B3261E',
  unshown: '#8F5F00',
  fontFamily,
  size: { tick: 11, label: 12, strong: 12.5 },
  stroke: { hair: 1, axis: 1, curve: 1.6, mark: 1.3 },
}

/** For white paper at 96 px to the inch: 10 px are 7.5 point. */
const print: PlotTheme = {
  ...screen,
  name: 'print',
  paper: '#FFFFFF',
  rule: '#D3D0C6',
  size: { tick: 9.5, label: 10, strong: 10.5 },
  stroke: { hair: 0.7, axis: 0.8, curve: 1.3, mark: 1.1 },
}

/** What colours become where there is ink of one colour only: told apart by lightness, fill and shape. */
const greyscale: PlotTheme = {
  ...print,
  name: 'greyscale',
  ink: '#1A1A1A',
  slate: '#555555',
  rule: '#D0D0D0',
  buff: '#E4E4E4',
  shoal: ['#F1F1F1', '#E0E0E0', '#C8C8C8'],
  channel: '#B5B5B5',
  sea: '#333333',
  magenta: '#1A1A1A',
  met: '#1A1A1A',
  unmet: '#1A1A1A',
  unshown: '#1A1A1A',
}

export const plotThemes = { screen, print, greyscale } as const satisfies Record<string, PlotTheme>
