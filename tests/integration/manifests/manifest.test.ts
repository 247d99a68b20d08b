import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Manifest, ManifestLoop, ManifestSource } from '#shared/types/manifest'
import { AuditEvent } from '#server/database/models/AuditEvent'
import { MembershipRow } from '#server/database/models/MembershipRow'
import { SourceRow } from '#server/database/models/SourceRow'
import { SystemRow } from '#server/database/models/SystemRow'
import { UploadRow } from '#server/database/models/UploadRow'
import { closeAnalysisPool } from '#server/adapters/analysisPool/analysisPool'
import { antennaMount } from '#server/demo/antennaMount'
import { converter } from '#server/demo/converter'
import { gangway } from '#server/demo/gangway'
import { storeDemoPeople } from '#server/demo/storeDemoPeople'
import { storeDemoSystem } from '#server/demo/storeDemoSystem'
import { deleteCondition } from '#server/services/conditions/deleteCondition'
import { listConditions } from '#server/services/conditions/listConditions'
import type { Actor, ServiceContext } from '#server/services/context'
import { deleteLoop } from '#server/services/loops/deleteLoop'
import { listLoops } from '#server/services/loops/listLoops'
import { exportManifest } from '#server/services/manifests/exportManifest'
import { importManifest } from '#server/services/manifests/importManifest'
import { readBoard } from '#server/services/systems/readBoard'
import { storeUpload } from '#server/services/uploads/storeUpload'
import { createSources } from '#server/services/sources/createSources'
import { buildCondition, buildLoop, buildSource, buildSystem } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { changedExample, manifestExample } from '../../factories/manifestExample'
import { openTestDatabase } from '../../factories/openTestDatabase'

let close: () => Promise<void>
let context: ServiceContext
beforeAll(async () => {
  close = (await openTestDatabase()).close
  const people = await storeDemoPeople(new Date('2026-12-01T09:00:00.000Z'))
  context = contextOf(people.get('engineer@tern.example') as Actor)
})
afterAll(async () => {
  await closeAnalysisPool()
  await close()
})

const again = async (text: string) => (await exportManifest((await importManifest(text, context)).id)).text
const sourceOf = (manifest: Manifest, index = 0) => (manifest.loops[0] as ManifestLoop).sources[index] as ManifestSource
const firstOf = <Entry>(entries: Entry[]) => entries[0] as Entry

describe('a manifest', () => {
  it('in the documentation is read, and written again byte for byte', async () => {
    expect(await again(await manifestExample())).toBe(await manifestExample())
  })

  it.each([['gangway', gangway], ['converter', converter], ['antenna mount', antennaMount]] as const)('of the %s of the demo makes a system with the same manifest and the same analyses', async (_, demo) => {
    const original = await storeDemoSystem(demo, context)
    const { text } = await exportManifest(original.id)
    const twin = await importManifest(text, context)
    expect((await exportManifest(twin.id)).text).toBe(text)
    const [before, after] = await Promise.all([readBoard(original.id, context), readBoard(twin.id, context)])
    expect(after.cells.map(({ analysis, failure }) => ({ analysis, failure }))).toEqual(before.cells.map(({ analysis, failure }) => ({ analysis, failure })))
    expect(after.cells.length).toBe(demo.loops.length * demo.conditions.length)
  })

  it('keeps files that are no text, files of one name, and texts that look like markup or hold odd characters', async () => {
    const system = await buildSystem(context, { name: '<b>"Bench" & \u2028 \u{1F6A2}</b>', description: 'two\r\nlines' })
    const loop = await buildLoop(system.id, context, { code: '1.e-5_' })
    const condition = await buildCondition(system.id, context, { code: '10', coordinates: [{ name: 'speed', unit: 'm/s', value: -5e-324 }] })
    const mapping = { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'real and imaginary', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' } as const
    const table = 'f,re,im\r\n1,-2,-2\r\n2,-1,-0.5\r\n3,-0.1,0.1\r\n4,-0.01,0.01\r\n'
    for (const bytes of [Buffer.from(table), Buffer.from(`\uFEFF${table}`), Buffer.from(`# 20 \xB0C\n${table}`, 'latin1'), Buffer.from(`\uFEFF${table}`, 'utf16le')]) {
      const upload = await storeUpload(system.id, { name: 'sweep.csv', bytes }, context)
      await createSources(loop.id, { conditionIds: [condition.id], name: 'sweep', ofRecord: false, setAsideReason: 'one of four', definition: { kind: 'measured', uploadId: upload.id, mapping } }, context)
    }
    const { text } = await exportManifest(system.id)
    const manifest = JSON.parse(text) as Manifest
    expect(manifest.uploads.map(upload => Object.keys(upload)[2])).toEqual(['text', 'text', 'base64', 'base64'])
    expect(await again(text)).toBe(text)
  })

  it('keeps a file whose long name was cut between two words or within a character', async () => {
    const system = await buildSystem(context)
    const loop = await buildLoop(system.id, context)
    const condition = await buildCondition(system.id, context)
    const mapping = { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'real and imaginary', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' } as const
    for (const name of [`${'a'.repeat(199)} sweep.csv`, `${'a'.repeat(199)}\u{1F6A2}.csv`]) {
      const upload = await storeUpload(system.id, { name, bytes: Buffer.from('1,-2,-2\n2,-1,-0.5\n3,-0.1,0.1\n') }, context)
      await createSources(loop.id, { conditionIds: [condition.id], name: 'sweep', ofRecord: false, setAsideReason: '', definition: { kind: 'measured', uploadId: upload.id, mapping } }, context)
    }
    const { text } = await exportManifest(system.id)
    expect(await again(text)).toBe(text)
  })

  it('keeps more sources of a loop than a system has conditions', async () => {
    const text = await changedExample((manifest) => {
      const design = sourceOf(manifest)
      firstOf(manifest.loops).sources.push(...Array.from({ length: 1001 }, (_, index) => ({ ...design, conditions: ['FULL'], name: `variant ${index}`, definition: { kind: 'coefficients' as const, numerator: [index], denominator: [1, 1] } })))
    })
    const written = (await exportManifest((await importManifest(text, context)).id)).text
    expect((JSON.parse(written) as Manifest).loops[0]?.sources).toHaveLength(1003)
    expect(await again(written)).toBe(written)
  })

  it('leaves out what is deleted, and what only points at it', async () => {
    const system = await buildSystem(context)
    const [stays, goes] = [await buildLoop(system.id, context, { code: 'STAYS' }), await buildLoop(system.id, context, { code: 'GOES' })]
    const [here, gone] = [await buildCondition(system.id, context), await buildCondition(system.id, context)]
    for (const loop of [stays, goes]) for (const condition of [here, gone]) await buildSource(loop.id, condition.id, context)
    await deleteLoop(goes.id, context)
    await deleteCondition(gone.id, context)
    const { text } = await exportManifest(system.id)
    const manifest = JSON.parse(text) as Manifest
    expect(manifest.conditions.map(({ code }) => code)).toEqual([here.code])
    expect(manifest.loops.map(({ code, sources }) => [code, sources.length])).toEqual([['STAYS', 1]])
    expect(await again(text)).toBe(text)
  })

  it('of an empty system is read', async () => {
    const { text } = await exportManifest((await buildSystem(context)).id)
    expect(await again(text)).toBe(text)
    const { id } = await importManifest(JSON.stringify({ format: 'wideberth system', version: 1, system: { name: 'Bare', frequencyUnit: 'Hz' } }), context)
    expect([await listLoops(id), await listConditions(id)]).toEqual([[], []])
  })

  it('makes its importer the engineer, nobody else a member, and is audited', async () => {
    const { id } = await importManifest(await manifestExample(), context)
    expect((await MembershipRow.findAll({ where: { systemId: id } })).map(({ personId, role }) => ({ personId, role }))).toEqual([{ personId: context.actor.id, role: 'engineer' }])
    expect(await AuditEvent.findOne({ where: { systemId: id }, order: [['id', 'DESC']] })).toMatchObject({ event: 'system imported', payload: { name: 'Bench axis', loops: 1, conditions: 2 } })
  })
})

describe('a manifest with a fault', () => {
  const cases: [string, (manifest: Manifest) => void, string, RegExp][] = [
    ['another format', manifest => Object.assign(manifest, { format: 'other' }), 'format', /'wideberth system'/],
    ['another version', manifest => Object.assign(manifest, { version: 2 }), 'version', /reads version 1/],
    ['a field that does not exist', manifest => Object.assign(manifest.system, { owner: 1 }), 'system', /'owner'/],
    ['a code that stands twice', manifest => firstOf(manifest.conditions).code = 'FULL', 'conditions[1].code', /FULL stands twice/],
    ['a value in an unknown condition', manifest => firstOf(manifest.parameters).values.C9 = 1, 'parameters[0].values.C9', /no operating condition C9/],
    ['a parameter that stands twice', manifest => manifest.parameters.push(firstOf(manifest.parameters)), 'parameters[1].name', /k stands twice/],
    ['a source in an unknown condition', manifest => sourceOf(manifest).conditions.push('C9'), 'loops[0].sources[0].conditions[2]', /no operating condition C9/],
    ['two sources of record', manifest => Object.assign(sourceOf(manifest), { ofRecord: true, setAsideReason: '' }), 'loops[0].sources[1].ofRecord', /exactly one/],
    ['no source of record', manifest => sourceOf(manifest, 1).ofRecord = false, 'loops[0].sources', /EMPTY no source .* of record/],
    ['the state of an unknown loop', manifest => firstOf(manifest.loops).loopStates.push({ loop: 'VEL', state: 'open' }), 'loops[0].loopStates[0].loop', /no loop VEL/],
    ['the state of the loop itself', manifest => firstOf(manifest.loops).loopStates.push({ loop: 'POS', state: 'open' }), 'loops[0].loopStates[0].loop', /only the others/],
    ['a block with the name of a parameter', manifest => firstOf(manifest.blocks).name = 'k', 'blocks[0].name', /k stands twice/],
    ['a gain in an unknown condition', manifest => firstOf(manifest.blocks).byCondition.C9 = { kind: 'deadTime', deadTime: 1, unit: 's' }, 'blocks[0].byCondition.C9', /no operating condition C9/],
    ['a block that names itself', manifest => firstOf(manifest.blocks).definition = { kind: 'expression', expression: '1/(s+P)' }, 'blocks[0].definition.expression', /P names itself/],
    ['blocks that name one another in a circle in one condition', (manifest) => {
      firstOf(manifest.blocks).byCondition.FULL = { kind: 'expression', expression: 'T/s' }
      Object.assign(manifest.blocks[1] ?? {}, { byCondition: { FULL: { kind: 'expression', expression: '1/(1+P)' } } })
    }, 'blocks[1].byCondition.FULL.expression', /in a circle: P, T, P/],
    ['a block with an unknown name', manifest => firstOf(manifest.blocks).byCondition.FULL = { kind: 'expression', expression: '1/(s+q)' }, 'blocks[0].byCondition.FULL.expression', /q/],
    ['a block with a section that is no number', manifest => firstOf(manifest.blocks).definition = { kind: 'sections', rows: [['1', '0', 'x', '1', '0', '0']], gain: '1', sampleTime: 1 }, 'blocks[0].definition.rows[0][2]', /"x" is no number/],
    ['matrices that the file does not hold', manifest => firstOf(manifest.blocks).definition = { kind: 'stateSpace', set: null, states: null, inputs: [], outputs: [], upload: { fileName: 'sweep1.csv', sha256: firstOf(manifest.uploads).sha256 } }, 'blocks[0].definition.upload', /./],
    ['a sampled block beside a continuous one without a hold', manifest => Object.assign(manifest.blocks[1] ?? {}, { definition: { kind: 'expression', expression: '1/z', sampleTime: 0.004 } }), 'loops[0].sources[0].definition.expression', /hold/],
    ['a break point at an unknown block', manifest => firstOf(manifest.loops).breakAt = { block: 'V', side: 'input' }, 'loops[0].breakAt.block', /no block V/],
    ['an upload that is not there', manifest => manifest.uploads = [], 'loops[0].sources[1].definition.upload', /no sweep1\.csv/],
    ['an id in place of an upload', manifest => Object.assign(sourceOf(manifest, 1).definition, { uploadId: 1 }), 'loops[0].sources[1].definition.uploadId', /Ids mean nothing/],
    ['no upload where one is needed', manifest => Object.assign(sourceOf(manifest, 1).definition, { upload: undefined }), 'loops[0].sources[1].definition.upload', /missing/],
    ['more blocks than a system holds', manifest => manifest.blocks = Array.from({ length: 501 }, (_, index) => ({ ...firstOf(manifest.blocks), name: `P${index}` })), 'blocks', /At most 500 blocks/],
    ['files that are read in too many ways', (manifest) => {
      const text = `${'1,2,3\n'.repeat(1_000_000)}`
      const upload = { fileName: 'sweep1.csv', sha256: createHash('sha256').update(text).digest('hex') }
      manifest.uploads = [{ ...upload, text }]
      const swept = sourceOf(manifest, 1)
      firstOf(manifest.loops).sources.push(...Array.from({ length: 100 }, (_, index) => {
        const definition = { ...swept.definition, upload } as typeof swept.definition
        Object.assign(definition, { mapping: { ...(swept.definition as { mapping: object }).mapping, firstColumn: index } })
        return { ...swept, ofRecord: false, definition }
      }))
      Object.assign(swept.definition, { upload })
    }, 'uploads', /100 ways, 600 MB together/],
    ['an upload changed on the way', manifest => Object.assign(firstOf(manifest.uploads), { text: 'f\n' }), 'uploads[0].sha256', /sweep1\.csv has the SHA-256/],
    ['an upload that nothing reads', manifest => manifest.uploads.push({ ...firstOf(manifest.uploads), fileName: 'other.csv' }), 'uploads[1]', /leave it out/],
    ['base 64 that is none', manifest => manifest.uploads = [{ fileName: 'sweep1.csv', sha256: firstOf(manifest.uploads).sha256, base64: 'a b' }], 'uploads[0].base64', /not base 64/],
    ['an unknown kind of definition', manifest => Object.assign(sourceOf(manifest).definition, { kind: 'guess' }), 'loops[0].sources[0].definition.kind', /./],
    ['an expression that cannot be read', manifest => Object.assign(sourceOf(manifest).definition, { expression: 'k/(s' }), 'loops[0].sources[0].definition.expression', /./],
    ['an expression with an unknown name', manifest => Object.assign(sourceOf(manifest).definition, { expression: 'q/s' }), 'loops[0].sources[0].definition.expression', /q/],
    ['columns that the file does not have', manifest => Object.assign(sourceOf(manifest, 1).definition, { mapping: { ...(sourceOf(manifest, 1).definition as { mapping: object }).mapping, firstColumn: 9 } }), 'loops[0].sources[1].definition.mapping', /cannot be read/],
  ]

  it.each(cases)('(%s) is refused at its place and stores nothing', async (_, change, path, words) => {
    const before = await Promise.all([SystemRow.count(), SourceRow.count(), UploadRow.count(), AuditEvent.count()])
    const refused = importManifest(await changedExample(change), context)
    await expect(refused).rejects.toMatchObject({ code: 'invalidInput' })
    const { details } = await refused.catch((error: unknown) => error) as { details: { faults: { path: string, message: string }[] } }
    expect(details.faults.find(fault => fault.path === path)?.message ?? details).toMatch(words)
    expect(await Promise.all([SystemRow.count(), SourceRow.count(), UploadRow.count(), AuditEvent.count()])).toEqual(before)
  })

  it('is told all of them at once', async () => {
    const text = await changedExample((manifest) => {
      firstOf(manifest.conditions).code = 'FULL'
      firstOf(manifest.loops).loopStates.push({ loop: 'VEL', state: 'open' })
      sourceOf(manifest).definition = { kind: 'coefficients', numerator: [], denominator: [1], deadTime: -1 }
    })
    const { details } = await importManifest(text, context).catch((error: unknown) => error) as { details: { faults: { path: string }[] } }
    expect(details.faults.map(fault => fault.path)).toEqual(expect.arrayContaining(['conditions[1].code', 'loops[0].loopStates[0].loop', 'loops[0].sources[0].definition.deadTime']))
  })

  it.each([['', 1, 1], ['{\n  "format": "wideberth system",\n  oops\n}', 3, 3], ['[]', undefined, undefined], ['null', undefined, undefined]])('is told where %j stops being one', async (text, line, column) => {
    await expect(importManifest(text, context)).rejects.toMatchObject({ code: 'invalidInput', ...(line !== undefined && { details: { line, column } }) })
  })

  it.each([
    ['a key twice, of which a parser keeps the last', '"values": {', '"values": { "FULL": 7, ', 46, /"FULL" stands twice/],
    ['a key written in another way once more', '"version": 1', '"version": 1, "\\u0076ersion": 1', 3, /"version" stands twice/],
    ['a name that parsers drop', '"values": {', '"values": { "__proto__": 7, ', 44, /"__proto__" is no name/],
  ] as const)('that holds %s is refused with line and column, and stores nothing', async (_, from, to, line, words) => {
    const before = await SystemRow.count()
    await expect(importManifest((await manifestExample()).replace(from, to), context)).rejects.toMatchObject({ code: 'invalidInput', message: expect.stringMatching(words) as unknown, details: { line } })
    expect(await SystemRow.count()).toBe(before)
  })

  it('does not leave behind what it read of a file that was taken back', async () => {
    const bad = await changedExample(manifest => Object.assign(sourceOf(manifest).definition, { expression: 'q/s' }))
    await expect(importManifest(bad, context)).rejects.toMatchObject({ code: 'invalidInput' })
    const other = 'Frequency (Hz),Real,Imaginary,Coherence\n0.5,-9,-3,1\n1,-5,-1,1\n2,-0.5,-0.3,1\n'
    const system = await buildSystem(context)
    const upload = await storeUpload(system.id, { name: 'sweep1.csv', bytes: Buffer.from(other) }, context)
    const { readPoints } = await import('#server/services/uploads/readPoints')
    const { mapping } = JSON.parse(await manifestExample()).loops[0].sources[1].definition
    expect((await readPoints(system.id, upload.id, mapping)).points[0]).toMatchObject({ re: -9 })
  })
})
