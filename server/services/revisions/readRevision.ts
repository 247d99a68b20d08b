import { AppError } from '#shared/errors/AppError'
import type { Revision } from '#shared/types/report'
import { findReport } from '../reports/findReport'
import { findSystem } from '../systems/findSystem'
import { findRevision } from './findRevision'
import { presentRevisions } from './listRevisions'
import type { RevisionReader } from './RevisionReader'

export interface RevisionDetail {
  revision: Revision
  report: { id: number, title: string, documentNumber: string, systemId: number }
  systemName: string
}

/** One revision with its artefacts, its newest job and what stands against issuing it. */
export async function readRevision(revisionId: number, reader: RevisionReader): Promise<RevisionDetail> {
  const row = await findRevision(revisionId, reader)
  const { id, title, documentNumber, systemId } = await findReport(row.reportId)
  const [[revision], system] = await Promise.all([presentRevisions([row], reader), findSystem(systemId)])
  if (!revision) throw new AppError('notFound', 'There is no such revision.')
  return { revision, report: { id, title, documentNumber, systemId }, systemName: system.name }
}
