import type { SourceChange } from '#shared/schemas/source'
import type { AnalysedSource } from '#shared/types/source'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { presentSource } from '../../presenters/presentSource'
import { assertNewest } from '../assertNewest'
import type { ServiceContext } from '../context'
import { assertDefinition } from './assertDefinition'
import { findSource } from './findSource'
import { findSystemOfSource } from './findSystemOfSource'
import { readSource } from './readSource'

/** Changes a source and analyses it. Throws 'conflict' from an older version, and where the definition is refused. */
export async function updateSource(sourceId: number, change: SourceChange, context: ServiceContext): Promise<AnalysedSource> {
  const { version, name, definition, setAsideReason } = change
  const before = await findSource(sourceId)
  const system = await findSystemOfSource(before)
  await assertDefinition(definition, system, [before.conditionId])
  await writeTransaction(async () => {
    const source = await findSource(sourceId)
    assertNewest(source, version, presentSource(source))
    await source.update({
      name,
      kind: definition.kind,
      definition,
      uploadId: definition.kind === 'measured' ? definition.uploadId : null,
      setAsideReason: source.ofRecord ? '' : setAsideReason,
      version: version + 1,
    })
    await recordAudit(context, 'source changed', { systemId: system.id, subjectId: sourceId, payload: { name, definition, setAsideReason } })
  })
  return readSource(sourceId, context)
}
