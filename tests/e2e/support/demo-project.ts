import type { Page } from '@playwright/test'
import { z } from 'zod'
import { projectListSchema } from '@/lib/schemas/lists'
import { BenchPage } from './bench-page'

/** The mount that the demo tells of. */
export const HILLSIDE = 'Hillside club mount'

/** Where the demo's mount lies, /projects/…, asked as whoever is signed in on the page. */
export async function demoAddress(page: Page): Promise<string> {
  // A copy that somebody brought in bears the same name, and has fewer people.
  const query = new URLSearchParams({ q: HILLSIDE, sort: 'people', direction: 'desc' })
  const { projects } = projectListSchema.parse(await (await page.request.get(`/api/projects?${query}`)).json())
  if (!projects[0]) throw new Error(`${HILLSIDE} is not among the projects of this person`)
  return `/projects/${projects[0].id}`
}

const entries = z.array(z.object({ id: z.uuid() })).optional()
const entriesSchema = z.object({ runs: entries, analyses: entries, corrections: entries })

type List = 'runs' | 'analyses' | 'corrections'

/** Where the first entry of one of the project's lists lies. */
export async function firstEntryAddress(page: Page, project: string, list: List): Promise<string> {
  const answer = await page.request.get(`/api${project}/${list}`)
  const first = entriesSchema.parse(await answer.json())[list]?.[0]
  if (!first) throw new Error(`The project has no ${list}`)
  return `${project}/${list}/${first.id}`
}

/** Opens the newest analysis of the demo's mount, and ends when its figures stand; its address. */
export async function openDemoAnalysis(page: Page): Promise<string> {
  const address = await firstEntryAddress(page, await demoAddress(page), 'analyses')
  await page.goto(address)
  await new BenchPage(page).allFigures()
  return address
}
