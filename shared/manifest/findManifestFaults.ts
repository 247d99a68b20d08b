import type { InputFault } from '../schemas/readBySchema'
import type { Manifest, ManifestLoop } from '../types/manifest'

/** Sources a manifest may hold, each counted once for every operating condition it is of. */
const mostSources = 100_000
/** Gains of blocks in single conditions that a manifest may hold. */
const mostGains = 20_000

/** What the parts of a manifest say of one another and cannot: codes and names that stand twice or are not there, and sources of record. */
export function findManifestFaults(manifest: Manifest): InputFault[] {
  const { conditions, parameters, blocks, loops, uploads } = manifest
  const codes = new Set(conditions.map(condition => condition.code))
  const blockNames = new Set(blocks.map(block => block.name))
  const loopCodes = new Set(loops.map(loop => loop.code))
  const unknownCodes = (record: object, path: string) => Object.keys(record).filter(code => !codes.has(code))
    .map(code => ({ path: `${path}.${code}`, message: `There is no operating condition ${code} among the conditions.` }))
  const sourceCount = loops.flatMap(loop => loop.sources).reduce((sum, source) => sum + source.conditions.length, 0)
  if (sourceCount > mostSources) return [{ path: 'loops', message: `There are ${sourceCount} sources, one for each condition counted; a manifest may hold ${mostSources}.` }]
  const gainCount = blocks.reduce((sum, { byCondition }) => sum + Object.keys(byCondition).length, 0)
  if (gainCount > mostGains) return [{ path: 'blocks', message: `There are ${gainCount} gains of blocks in single conditions; a manifest may hold ${mostGains}.` }]
  return [
    ...standingTwice(conditions.map(({ code }, index) => ({ path: `conditions[${index}].code`, name: code })), 'another operating condition'),
    ...standingTwice([
      ...parameters.map(({ name }, index) => ({ path: `parameters[${index}].name`, name })),
      ...blocks.map(({ name }, index) => ({ path: `blocks[${index}].name`, name })),
    ], 'another parameter or block'),
    ...standingTwice(loops.map(({ code }, index) => ({ path: `loops[${index}].code`, name: code })), 'another loop'),
    ...standingTwice(uploads.map(({ fileName, sha256 }, index) => ({ path: `uploads[${index}].sha256`, name: `${sha256} ${fileName}` })), 'another upload'),
    ...parameters.flatMap(({ values }, index) => unknownCodes(values, `parameters[${index}].values`)),
    ...blocks.flatMap(({ byCondition }, index) => unknownCodes(byCondition, `blocks[${index}].byCondition`)),
    ...loops.flatMap((loop, index) => [
      ...faultsOfStructure(loop, `loops[${index}]`, blockNames, loopCodes),
      ...faultsOfSources(loop, `loops[${index}]`, codes),
    ]),
  ]
}

function standingTwice(entries: { path: string, name: string }[], what: string): InputFault[] {
  const seen = new Set<string>()
  return entries.flatMap(({ path, name }) => {
    if (!seen.has(name)) {
      seen.add(name)
      return []
    }
    return [{ path, message: `${name} stands twice: ${what} has it already.` }]
  })
}

function faultsOfStructure({ code, breakAt, loopStates }: ManifestLoop, path: string, blockNames: ReadonlySet<string>, loopCodes: ReadonlySet<string>): InputFault[] {
  return [
    ...(breakAt !== null && !blockNames.has(breakAt.block) ? [{ path: `${path}.breakAt.block`, message: `There is no block ${breakAt.block} among the blocks.` }] : []),
    ...standingTwice(loopStates.map(({ loop }, index) => ({ path: `${path}.loopStates[${index}].loop`, name: loop })), 'another state'),
    ...loopStates.flatMap(({ loop }, index) => {
      if (loop === code) return [{ path: `${path}.loopStates[${index}].loop`, message: 'A loop is open at its own break point: only the others have a state.' }]
      return loopCodes.has(loop) ? [] : [{ path: `${path}.loopStates[${index}].loop`, message: `There is no loop ${loop} among the loops.` }]
    }),
  ]
}

/** Each source in known conditions, each of them once; of the sources of a condition exactly one of record. */
function faultsOfSources({ sources }: ManifestLoop, path: string, codes: ReadonlySet<string>): InputFault[] {
  const faults: InputFault[] = []
  const ofRecord = new Map<string, boolean>()
  sources.forEach((source, index) => {
    const place = `${path}.sources[${index}].conditions`
    faults.push(...standingTwice(source.conditions.map((name, at) => ({ path: `${place}[${at}]`, name })), 'this source'))
    source.conditions.forEach((code, at) => {
      if (!codes.has(code)) faults.push({ path: `${place}[${at}]`, message: `There is no operating condition ${code} among the conditions.` })
      if (source.ofRecord && ofRecord.get(code)) faults.push({ path: `${path}.sources[${index}].ofRecord`, message: `In the condition ${code} another source of this loop is of record already: exactly one is.` })
      ofRecord.set(code, source.ofRecord || (ofRecord.get(code) ?? false))
    })
    if (source.ofRecord && source.setAsideReason !== '') faults.push({ path: `${path}.sources[${index}].setAsideReason`, message: 'A source of record is not set aside: leave the reason empty.' })
  })
  for (const [code, has] of ofRecord) {
    if (!has) faults.push({ path: `${path}.sources`, message: `In the condition ${code} no source of this loop is of record: choose one.` })
  }
  return faults
}
