import type { Stability } from '#shared/types/analysis'

const count = (value: number, one: string, many: string) => `${value === 0 ? 'no' : value} ${value === 1 ? one : many}`

function countWords({ openLoopUnstablePoles, encirclements, closedLoopUnstablePoles }: Stability): string {
  if (openLoopUnstablePoles === null || encirclements === null) return ''
  const open = count(openLoopUnstablePoles, 'open-loop pole', 'open-loop poles')
  const turns = encirclements === 0 ? 'no encirclement' : `${Math.abs(encirclements)} ${encirclements > 0 ? 'counter-clockwise' : 'clockwise'} ${Math.abs(encirclements) === 1 ? 'encirclement' : 'encirclements'} of the critical point`
  const closed = closedLoopUnstablePoles === null ? '' : `, so ${count(closedLoopUnstablePoles, 'closed-loop pole', 'closed-loop poles')} beyond it`
  return `${open} beyond the stability boundary and ${turns}${closed}`
}

const bases: Record<Stability['basis'], string> = {
  'counted': 'counted',
  'observed': 'observed during the test',
  'observed and counted': 'observed during the test and counted',
}

/** The closed-loop verdict in words: the verdict first, then what it rests on. */
export function closedLoopWords(stability: Stability): string {
  const counted = countWords(stability)
  const basis = stability.verdict === 'undetermined' ? '' : ` (${bases[stability.basis]})`
  return [
    `Closed loop ${stability.verdict}${basis}${counted === '' ? '' : `: ${counted}`}.`,
    stability.reason === undefined ? '' : sentence(stability.reason),
  ].filter(part => part !== '').join(' ')
}

function sentence(text: string): string {
  const trimmed = text.trim()
  const start = trimmed.charAt(0).toUpperCase() + trimmed.slice(1)
  return /[.!?]$/.test(start) ? start : `${start}.`
}
