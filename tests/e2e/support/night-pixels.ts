import { expect, type Page } from '@playwright/test'
import { PNG } from 'pngjs'

interface Stray {
  strayCount: number
  first: string | null
}

/**
 * Fails when a screenshot of the whole page holds one pixel whose green or blue is above zero; names the first of them.
 * Pictures take a moment to be drawn in new colours or at a new width, so it looks again for a while.
 */
export async function expectOnlyRedPixels(page: Page, screen: string): Promise<void> {
  await expect(async () => {
    const found = strayPixels(PNG.sync.read(await page.screenshot({ fullPage: true })))
    expect(found, `pixels with green or blue on ${screen}`).toEqual({ strayCount: 0, first: null })
  }).toPass({ intervals: [300, 1000], timeout: 10_000 })
}

function strayPixels({ data, width, height }: PNG): Stray {
  let strayCount = 0
  let first: string | null = null
  for (let offset = 0; offset < width * height * 4; offset += 4) {
    if (data[offset + 1] > 0 || data[offset + 2] > 0) {
      strayCount += 1
      const pixel = offset / 4
      first ??= `x ${pixel % width}, y ${Math.floor(pixel / width)}: rgb(${data[offset]}, ${data[offset + 1]}, ${data[offset + 2]})`
    }
  }
  return { strayCount, first }
}
