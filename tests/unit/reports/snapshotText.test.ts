import { describe, expect, it } from 'vitest'
import { canonicalJson } from '#server/reports/canonicalJson'
import { parseSnapshot, writeSnapshot } from '#server/reports/snapshotText'
import type { BlockGain } from '#shared/types/block'
import type { ReportSnapshot } from '#shared/types/snapshot'
import { buildSnapshot } from '../../factories/buildSnapshot'

const plant: BlockGain = { kind: 'coefficients', numerator: [1], denominator: Array.from({ length: 80 }, (_, k) => k + 1) }
const controller: BlockGain = { kind: 'expression', expression: 'kP' }

/** Every cell's loop gain built from the same two blocks, the source set aside too. */
function builtFromBlocks(): ReportSnapshot {
  const snapshot = buildSnapshot()
  const input = { expression: 'C*G', blocks: { C: controller, G: plant } }
  return {
    ...snapshot,
    cells: snapshot.cells.map(cell => ({
      ...cell, input, otherSources: [{ name: 'first model', kind: 'expression' as const, setAsideReason: 'older', input, analysis: null, failure: null, difference: null }],
    })),
  }
}

describe('the text of a snapshot', () => {
  it('is plain canonical JSON where no block stands in it', () => {
    const snapshot = buildSnapshot()
    expect(writeSnapshot(snapshot)).toBe(canonicalJson(snapshot))
  })

  it('holds a long gain once, however many loops are built from it, and gives it back in every place', () => {
    const snapshot = builtFromBlocks()
    const text = writeSnapshot(snapshot)
    expect(text.split(canonicalJson(plant)).length - 1).toBe(1)
    expect(text.split(canonicalJson(controller)).length - 1).toBe(2 * snapshot.cells.length)
    expect(parseSnapshot(text)).toEqual(JSON.parse(canonicalJson(snapshot)))
  })

  it('is the same again when it is read and written', () => {
    const text = writeSnapshot(builtFromBlocks())
    expect(writeSnapshot(parseSnapshot(text))).toBe(text)
  })

  it('is refused where a gain that a loop needs is missing', () => {
    const text = writeSnapshot(builtFromBlocks()).replace(/"gains":\{"[0-9a-f]{64}"/, `"gains":{"${'0'.repeat(64)}"`)
    expect(() => parseSnapshot(text)).toThrow(/the snapshot lacks the gain [0-9a-f]{64}/)
  })
})
