import type { Config } from 'tailwindcss'

/** The tokens of the art direction, one name each; figures and the report read the same values from shared/plots/theme. */
export default {
  content: ['./app/**/*.{vue,ts}'],
  theme: {
    extend: {
      colors: {
        paper: '#FBFAF6',
        ink: '#13233F',
        slate: '#51607A',
        rule: '#DAD7CC',
        buff: '#F2E8CF',
        shoal: { 1: '#E3F0F6', 2: '#C6E1EE', 3: '#9CCBE2' },
        sea: '#0C5A7D',
        magenta: '#A3195B',
        met: '#1B6E4B',
        unmet: '#B3261E',
        unshown: '#8F5F00',
      },
      fontFamily: { sans: ['"Noto Sans"', 'sans-serif'], mono: ['"Noto Sans Mono"', 'monospace'] },
      fontSize: { note: ['12.5px', '17px'], title: ['25px', '32px'] },
      borderRadius: { DEFAULT: '3px' },
    },
  },
} satisfies Config
