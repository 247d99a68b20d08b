import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { ReportAssets } from './ReportAssets'

/** The files as they lie in the source tree: for tests and scripts. `root` is the project's folder. */
export const readAssetsFromFolder = (root: string): ReportAssets => ({
  template: path => readFile(join(root, 'templates/report', path), 'utf8'),
  font: (fontPackage, file) => readFile(join(root, 'node_modules/@fontsource', fontPackage, 'files', file)),
})
