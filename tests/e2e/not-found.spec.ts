import { expect, test } from '@playwright/test'
import { demoAddress } from './support/demo-project'
import { enterAs } from './support/people'

const NOBODYS_ID = '5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e11'

test('addresses that name nothing lead to the page that says so', async ({ page }) => {
  await enterAs(page.context(), 'viewer')
  const project = await demoAddress(page)
  const below = ['runs', 'analyses', 'corrections'].map((part) => `${project}/${part}`)
  for (const folder of ['/projects', ...below]) {
    for (const id of [NOBODYS_ID, 'no-uuid']) {
      const response = await page.goto(`${folder}/${id}`)
      expect(response?.status(), `${folder}/${id}`).toBe(404)
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
    }
  }
})
