import { ZipArchive } from 'archiver'
import { AppError } from '#shared/errors/AppError'
import { sha256Of } from '../sha256Of'

export interface PackagedFile {
  /** path inside the archive, with forward slashes */
  name: string
  data: Buffer | string
}

/** A ZIP keeps local times without a zone; this is the earliest date it can carry for every reader, so that no clock gets in. */
const fixedDate = new Date('1980-01-02T00:00:00Z')

/**
 * The files as one ZIP in the order given, with a SHA256SUMS beside them that `sha256sum -c` accepts.
 * Dates and modes are fixed: equal files give equal bytes.
 */
export async function zipOf(files: readonly PackagedFile[]): Promise<Buffer> {
  const sums = files.map(file => `${sha256Of(file.data)}  ${file.name}\n`).join('')
  const archive = new ZipArchive({ zlib: { level: 6 } })
  const chunks: Buffer[] = []
  const finished = new Promise<void>((resolve, reject) => {
    archive.on('data', (chunk: Buffer) => chunks.push(chunk))
    archive.on('end', resolve)
    archive.on('error', reject)
    archive.on('warning', reject)
  })
  for (const { name, data } of [...files, { name: 'SHA256SUMS', data: sums }]) {
    if (name.startsWith('/') || name.split('/').includes('..')) throw new AppError('unexpected', `'${name}' is no path inside an archive`)
    archive.append(data, { name, date: fixedDate, mode: 0o644 })
  }
  await Promise.all([archive.finalize(), finished])
  return Buffer.concat(chunks)
}
