import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { expect, type Page } from '@playwright/test'
import type { AxeResults } from 'axe-core'

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8')

/**
 * Fails with the rule, the reason and the elements of every accessibility fault that axe-core finds on the page as it
 * stands; while a modal dialog is open that is the dialog, since nothing behind it can be reached.
 */
export async function expectNoAxeViolations(page: Page, screen: string): Promise<void> {
  await page.evaluate(axeSource)
  const results = await page.evaluate(() => {
    const { axe } = window as unknown as { axe: { run(part: Element | Document): Promise<AxeResults> } }
    return axe.run(document.querySelector('dialog:modal') ?? document)
  })
  const faults = results.violations.map(({ id, help, nodes }) => ({
    id,
    help,
    elements: nodes.slice(0, 5).map((node) => `${node.target.join(' ')}: ${node.failureSummary}`),
  }))
  expect(faults, `axe on ${screen}`).toEqual([])
}
