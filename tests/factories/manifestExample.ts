import { readFile } from 'node:fs/promises'
import type { Manifest } from '#shared/types/manifest'

/** The example in docs/manifest.md as it stands there. */
export async function manifestExample(): Promise<string> {
  const [, example] = /```json\n([\s\S]*?)```/.exec(await readFile('docs/manifest.md', 'utf8')) ?? []
  if (example === undefined) throw new Error('docs/manifest.md has no example.')
  return example
}

/** The same with a change to its data. */
export async function changedExample(change: (manifest: Manifest) => void): Promise<string> {
  const manifest = JSON.parse(await manifestExample()) as Manifest
  change(manifest)
  return JSON.stringify(manifest)
}
