import type { SectionView } from './ReportView'

const cautions = [
  { term: 'One loop at a time', words: 'Each loop is opened alone, the others in the state its chapter states. A simultaneous change in several loops is not covered.' },
  { term: 'Frozen conditions', words: 'Each operating condition is looked at as frozen. Nothing is said of the way between two conditions.' },
  { term: 'Linear at the stated amplitude', words: 'Margins are linear: they hold at the amplitude they were measured or modelled for. Saturation, friction, backlash and rate limits change them.' },
  { term: 'The data given', words: 'Margins hold for the models and measurements given, and are no better than these. A mode that is in neither is in no margin.' },
  { term: 'Measured responses', words: 'Between samples nothing is proven. Gaps that cannot be trusted are listed; a narrow resonance inside one may have been missed.' },
  { term: 'Complex coefficients', words: 'Loops with complex coefficients (three-phase quantities in rotating coordinates, forward and backward whirl) need negative frequencies and are not covered.' },
  { term: 'Evidence, no certificate', words: 'Margins are evidence and no certificate. Local codes, the applicable standard and a licensed or responsible engineer decide.' },
  { term: 'Closing a loop', words: 'A loop is never to be closed on hardware on the strength of these margins alone.' },
]

/** What the numbers of this report do not say. */
export const cautionsSection = (number: string): SectionView => ({
  number,
  anchor: 'cautions',
  title: 'Cautions',
  introduction: ['Read these before using any number of this report.'],
  blocks: [{ title: '', paragraphs: [], items: cautions, table: null }],
})
