import { createRequire } from 'node:module'
import type { AxeResults } from 'axe-core'
import type { Page } from 'playwright-core'
import { expect } from 'vitest'

const axePath = createRequire(import.meta.url).resolve('axe-core/axe.min.js')
const rules = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa']

export interface AxeFault { rule: string, help: string, places: string[] }

/** Every fault against WCAG 2.2 A and AA that axe finds on the page as it stands; the page's context must bypass its policy on scripts. */
export async function axeFaults(page: Page): Promise<AxeFault[]> {
  await page.addScriptTag({ path: axePath })
  const results = await page.evaluate(async (values): Promise<AxeResults> => {
    const { axe } = globalThis as unknown as { axe: typeof import('axe-core') }
    return axe.run(document, { runOnly: { type: 'tag', values } })
  }, rules)
  expect(results.passes.length, 'axe looked at the page').toBeGreaterThan(5)
  return results.violations.map(({ id, help, nodes }) => ({ rule: id, help, places: nodes.map(({ html, target }) => `${target.join(' ')}: ${html.slice(0, 200)}`) }))
}
