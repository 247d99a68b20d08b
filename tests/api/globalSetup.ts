import type { TestProject } from 'vitest/node'
import { ensureBuild } from '../../scripts/setUp/ensureBuild.mjs'

declare module 'vitest' {
  export interface ProvidedContext {
    /** the entry of the built server */
    serverEntry: string
  }
}

/** Builds the application once for all files, unless the build is of these very sources. */
export default async function setup(project: TestProject): Promise<void> {
  project.provide('serverEntry', await ensureBuild())
}
