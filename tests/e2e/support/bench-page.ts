import { expect, type Locator, type Page } from '@playwright/test'
import type { FixtureFile } from '../fixtures/recordings'

/** The open bench as a visitor uses it. */
export class BenchPage {
  readonly title: Locator

  constructor(readonly page: Page) {
    this.title = page.getByRole('heading', { level: 1 })
  }

  async open(): Promise<void> {
    await this.page.goto('/bench')
    await expect(this.page.getByRole('button', { name: 'Choose a file' })).toBeEnabled()
  }

  /** Lets go of a file over the page, as from the desktop. */
  async drop({ name, mimeType, buffer }: FixtureFile): Promise<void> {
    const transfer = await this.page.evaluateHandle(
      ({ text, fileName, type }) => {
        const bytes = Uint8Array.from(atob(text), (letter) => letter.charCodeAt(0))
        const data = new DataTransfer()
        data.items.add(new File([bytes], fileName, { type }))
        return data
      },
      { text: buffer.toString('base64'), fileName: name, type: mimeType },
    )
    await this.page.getByText('Drop a recording of a star here').dispatchEvent('drop', { dataTransfer: transfer })
  }

  async choose(file: FixtureFile | string): Promise<void> {
    await this.page.getByLabel('Recording file').setInputFiles(file)
  }

  async measuredOnTheAxis(): Promise<void> {
    await this.page.getByLabel('The displacement is measured').selectOption('axis')
  }

  /** Sends the form with the columns as they are. */
  async read(): Promise<void> {
    await this.page.getByRole('button', { name: 'Show the worm' }).click()
  }

  /** The key figure under this name as it is shown: value, uncertainty and unit in one text. */
  async figure(name: string | RegExp): Promise<string> {
    const strip = this.page.getByRole('region', { name: 'Key figures' })
    await expect(strip).toBeVisible({ timeout: 45_000 })
    const term = strip.locator('dt').filter({ hasText: name })
    return (await term.locator('xpath=following-sibling::dd').innerText()).replace(/\s+/g, ' ')
  }

  /** All key figures as they are shown, for comparing two views of the same work to the last digit. */
  async allFigures(): Promise<string> {
    const strip = this.page.getByRole('region', { name: 'Key figures' })
    await expect(strip).toBeVisible({ timeout: 45_000 })
    return strip.innerText()
  }
}

/** The first number in a text that people read: true minus sign, thin spaces. */
export function firstNumber(text: string): number {
  const match = /[−-]?\d+(?:\.\d+)?/.exec(text)
  if (!match) throw new Error(`There is no number in “${text}”`)
  return Number(match[0].replace('−', '-'))
}
