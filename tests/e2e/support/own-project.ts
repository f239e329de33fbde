import { expect, type Page } from '@playwright/test'
import { z } from 'zod'
import { SERVER_ORIGIN } from './server'

interface OwnProject {
  name: string
  /** /projects/… */
  address: string
}

/** A project of the test's own, made by whoever is signed in on the page, so that the demo stays as others expect it. */
export async function makeOwnProject(page: Page, purpose: string): Promise<OwnProject> {
  const name = `${purpose} ${Date.now()}`
  const answer = await page.request.post('/api/projects', {
    headers: { origin: SERVER_ORIGIN },
    data: { name, driveTrain: { axisKind: 'worm', wheelTeeth: 152, wormStarts: 1, stages: [] } },
  })
  expect(answer.status()).toBe(201)
  const { id } = z.object({ id: z.uuid() }).parse(await answer.json())
  return { name, address: `/projects/${id}` }
}
