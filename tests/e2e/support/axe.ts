import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { expect, type Page } from '@playwright/test'
import type { AxeResults } from 'axe-core'

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8')

/** Fails with the rule, the reason and the elements of every accessibility fault that axe-core finds on the page as it stands. */
export async function expectNoAxeViolations(page: Page, screen: string): Promise<void> {
  await page.evaluate(axeSource)
  const results = await page.evaluate(() => (window as unknown as { axe: { run(): Promise<AxeResults> } }).axe.run())
  const faults = results.violations.map(({ id, help, nodes }) => ({
    id,
    help,
    elements: nodes.slice(0, 5).map((node) => `${node.target.join(' ')}: ${node.failureSummary}`),
  }))
  expect(faults, `axe on ${screen}`).toEqual([])
}
