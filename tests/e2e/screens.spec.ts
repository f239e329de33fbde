import { expect, test, type Page } from '@playwright/test'
import { visitorRecording } from './fixtures/recordings'
import { BenchPage } from './support/bench-page'
import { expectNoAxeViolations } from './support/axe'
import { expectOnlyRedPixels } from './support/night-pixels'
import { askToSignUp, demoPerson, newcomer, signIn } from './support/people'
import { reportIsDrawn, SharePanel } from './support/report-page'
import { chooseTheme } from './support/themes'

interface Screen {
  name: string
  /** Goes there; ends when all of it is drawn. */
  open: (page: Page) => Promise<void>
  /** Whether a member of the demo's project has to be signed in. */
  isMembersOnly: boolean
}

async function projectAddress(page: Page): Promise<string> {
  await page.goto('/projects')
  const link = page.getByRole('link', { name: 'Hillside club mount' }).first()
  await expect(link).toBeVisible()
  return (await link.getAttribute('href')) ?? ''
}

/** Pictures are drawn by a library that is fetched when the page is idle. */
async function benchIsDrawn(page: Page): Promise<void> {
  await new BenchPage(page).allFigures()
  await expect(page.locator('.js-plotly-plot .main-svg').first()).toBeVisible({ timeout: 45_000 })
  await expect(page.getByRole('progressbar')).toHaveCount(0, { timeout: 45_000 })
}

function visit(name: string, path: string): Screen {
  return {
    name,
    isMembersOnly: false,
    open: async (page) => {
      await page.goto(path)
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
    },
  }
}

function memberVisit(name: string, subPath: string): Screen {
  return {
    name,
    isMembersOnly: true,
    open: async (page) => {
      await page.goto((await projectAddress(page)) + subPath)
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
      await expect(page.getByText('Loading')).toHaveCount(0)
    },
  }
}

/** The first entry of one of the project's lists. */
function memberEntry(name: string, list: 'runs' | 'analyses' | 'corrections', isBench: boolean): Screen {
  return {
    name,
    isMembersOnly: true,
    open: async (page) => {
      await page.goto(`${await projectAddress(page)}/${list}`)
      await page.getByRole('table').getByRole('link').first().click()
      await page.waitForURL(new RegExp(`/${list}/[0-9a-f-]+`))
      if (isBench) await benchIsDrawn(page)
      else await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
    },
  }
}

async function openFirstAnalysis(page: Page): Promise<void> {
  await page.goto(`${await projectAddress(page)}/analyses`)
  await page.getByRole('table').getByRole('link').first().click()
  await page.waitForURL(/\/analyses\/[0-9a-f-]+/)
  await benchIsDrawn(page)
}

const screens: Screen[] = [
  visit('landing', '/'),
  visit('sign-in', '/sign-in'),
  visit('sign-up', '/sign-up'),
  {
    name: 'local mail',
    isMembersOnly: false,
    open: async (page) => {
      await page.goto('/local-mail')
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
      await expect(page.getByText('Getting the')).toHaveCount(0)
    },
  },
  {
    name: 'sign-up, waiting for the mail',
    isMembersOnly: false,
    open: async (page) => {
      await page.goto('/sign-up')
      await askToSignUp(page, newcomer())
    },
  },
  {
    name: 'link of a sign-up in another browser',
    isMembersOnly: false,
    open: async (page) => {
      await page.goto('/sign-up')
      const link = await askToSignUp(page, newcomer())
      await page.context().clearCookies()
      await page.goto(link)
      await expect(page.getByRole('button', { name: 'Make my account' })).toBeVisible()
    },
  },
  visit('link that has ended', '/verify-email?token=unknown'),
  visit('reset by mail', '/reset-password'),
  visit('not-found', '/no-such-page'),
  visit('invitation that opens nothing', '/invite/no-such-link'),
  visit('bench intake', '/bench'),
  {
    name: 'column mapper',
    isMembersOnly: false,
    open: async (page) => {
      const bench = new BenchPage(page)
      await bench.open()
      await bench.choose(visitorRecording().file)
      await expect(bench.title).toHaveText('Which column is what?')
    },
  },
  {
    name: 'bench with the sample run',
    isMembersOnly: false,
    open: async (page) => {
      await page.goto('/bench?sample=1')
      await benchIsDrawn(page)
    },
  },
  {
    name: 'projects',
    isMembersOnly: true,
    open: async (page) => {
      await projectAddress(page)
    },
  },
  { ...visit('new project', '/projects/new'), isMembersOnly: true },
  { ...visit('import of an archive', '/projects/import'), isMembersOnly: true },
  { ...visit('account', '/account'), isMembersOnly: true },
  memberVisit('overview', ''),
  memberVisit('drive train', '/drive'),
  memberVisit('runs', '/runs'),
  memberVisit('new run', '/runs/new'),
  memberEntry('run', 'runs', true),
  memberVisit('analyses', '/analyses'),
  memberEntry('analysis', 'analyses', true),
  memberVisit('corrections', '/corrections'),
  {
    name: 'share links',
    isMembersOnly: true,
    open: async (page) => {
      await openFirstAnalysis(page)
      const panel = new SharePanel(page)
      await panel.open()
      await panel.make('To look at')
    },
  },
  {
    name: 'report',
    isMembersOnly: true,
    open: async (page) => {
      await openFirstAnalysis(page)
      const panel = new SharePanel(page)
      await panel.open()
      await page.goto(await panel.make('To look at'))
      await reportIsDrawn(page)
    },
  },
  {
    name: 'report of a saved analysis',
    isMembersOnly: true,
    open: async (page) => {
      await openFirstAnalysis(page)
      await page.getByRole('link', { name: 'Print report' }).click()
      await page.waitForURL(/\/report$/)
      await reportIsDrawn(page)
    },
  },
  memberEntry('correction', 'corrections', false),
  memberVisit('people', '/people'),
  memberVisit('settings', '/settings'),
  memberVisit('log of the project', '/settings/trail'),
  memberVisit('runs, none of which matches', '/runs?q=no-such-run'),
]

for (const isMembersOnly of [false, true]) {
  test.describe(isMembersOnly ? 'for members' : 'for everyone', () => {
    test.beforeEach(async ({ page }) => {
      if (isMembersOnly) await signIn(page, demoPerson('owner'))
    })

    for (const screen of screens.filter((each) => each.isMembersOnly === isMembersOnly)) {
      test(`${screen.name}: accessible in Day and Dusk, only red in Night`, async ({ page, context, baseURL }) => {
        const consoleFaults: string[] = []
        page.on('console', (message) => {
          if (message.type() === 'error' || message.type() === 'warning') consoleFaults.push(message.text())
        })
        page.on('pageerror', (error) => consoleFaults.push(String(error)))
        await screen.open(page)
        for (const theme of ['day', 'dusk'] as const) {
          await chooseTheme(context, baseURL ?? '', theme)
          await page.evaluate((chosen) => (document.documentElement.dataset.theme = chosen), theme)
          await expectNoAxeViolations(page, `${screen.name}, ${theme}`)
        }
        await chooseTheme(context, baseURL ?? '', 'night')
        await page.evaluate(() => (document.documentElement.dataset.theme = 'night'))
        await page.waitForTimeout(300)
        await expectOnlyRedPixels(page, `${screen.name} at 1440`)
        await page.setViewportSize({ width: 390, height: 844 })
        await page.waitForTimeout(300)
        await expectOnlyRedPixels(page, `${screen.name} at 390`)
        const overflow = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth)
        expect(overflow, `${screen.name} is wider than a phone by`).toBeLessThanOrEqual(0)
        const expected404 = screen.name === 'not-found' ? 1 : 0
        expect(consoleFaults.filter((text) => !/404/.test(text) || !expected404)).toEqual([])
      })
    }
  })
}
