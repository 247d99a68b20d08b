import type { Verdict } from '#shared/types/criterion'
import type { Tone } from './ReportView'

const tones: Record<Verdict, Tone> = {
  'unstable': 'bad',
  'not met': 'bad',
  'not shown': 'open',
  'no data': 'open',
  'not met, accepted by deviation': 'accepted',
  'met': 'met',
  'met, no limit': 'met',
  'not applicable': 'quiet',
}

/** The tone a verdict is printed in, beside its word. */
export const verdictTone = (verdict: Verdict): Tone => tones[verdict]
