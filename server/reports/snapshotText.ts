import type { BlockGain } from '#shared/types/block'
import type { LoopInput } from '#shared/types/analysis'
import type { ReportSnapshot } from '#shared/types/snapshot'
import { canonicalJson } from './canonicalJson'
import { sha256Of } from './sha256Of'

/** In the place of a block's gain that stands once in the text for every loop that is built from it. */
interface GainElsewhere { kind: 'gain', sha256: string }

/** Gains longer than this (characters) are written once: the matrices of a plant would otherwise stand in every loop and condition. */
const shortGain = 200

type Replace = (gain: BlockGain | GainElsewhere) => BlockGain | GainElsewhere

/** A copy whose inputs have each block's gain replaced. */
function withGains(snapshot: ReportSnapshot, replace: Replace): ReportSnapshot {
  const inInput = (input: LoopInput | null): LoopInput | null => {
    if (input === null || !('expression' in input) || input.blocks === undefined) return input
    return { ...input, blocks: Object.fromEntries(Object.entries(input.blocks).map(([name, gain]) => [name, replace(gain) as BlockGain])) }
  }
  return {
    ...snapshot,
    cells: snapshot.cells.map(cell => ({
      ...cell,
      input: inInput(cell.input),
      ...cell.otherSources && { otherSources: cell.otherSources.map(other => ({ ...other, input: inInput(other.input) })) },
    })),
  }
}

/** The canonical JSON of a snapshot, in which a block's gain that is long stands once, under its SHA-256 in `gains`. */
export function writeSnapshot(snapshot: ReportSnapshot): string {
  const gains: Record<string, BlockGain> = {}
  const packed = withGains(snapshot, (gain) => {
    const text = canonicalJson(gain)
    if (gain.kind === 'gain' || text.length <= shortGain) return gain
    const sha256 = sha256Of(text)
    gains[sha256] = gain
    return { kind: 'gain', sha256 }
  })
  return canonicalJson(Object.keys(gains).length === 0 ? packed : { ...packed, gains })
}

/** The snapshot of such a text, every gain in its place. @throws RangeError for a gain that the text does not hold */
export function parseSnapshot(text: string): ReportSnapshot {
  const { gains = {}, ...snapshot } = JSON.parse(text) as ReportSnapshot & { gains?: Record<string, BlockGain> }
  return withGains(snapshot, (gain) => {
    if (gain.kind !== 'gain') return gain
    const found = Object.hasOwn(gains, gain.sha256) ? gains[gain.sha256] : undefined
    if (found === undefined) throw new RangeError(`the snapshot lacks the gain ${gain.sha256}`)
    return found
  })
}
