import { expect, test, type Page } from '@playwright/test'
import { visitorRecording } from './fixtures/recordings'
import { BenchPage } from './support/bench-page'
import { expectNoAxeViolations } from './support/axe'
import { expectOnlyRedPixels } from './support/night-pixels'
import { demoAddress, firstEntryAddress, HILLSIDE } from './support/demo-project'
import { addWholeNote, noteWith } from './support/notes-page'
import { askToSignUp, demoPerson, enterAs, newcomer, type DemoPerson } from './support/people'
import { newAddress } from './support/people-page'
import { reportIsDrawn, SharePanel } from './support/report-page'
import { showTheme } from './support/themes'

interface Screen {
  name: string
  /** Goes there; ends when all of it is drawn. */
  open: (page: Page) => Promise<void>
  /** As which person of the demo; null: nobody is signed in. */
  who: DemoPerson['role'] | null
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
    who: null,
    open: async (page) => {
      await page.goto(path)
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
    },
  }
}

function memberVisit(name: string, subPath: string): Screen {
  return {
    name,
    who: 'owner',
    open: async (page) => {
      await page.goto((await demoAddress(page)) + subPath)
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
      await expect(page.getByText('Loading')).toHaveCount(0)
    },
  }
}

/** The first entry of one of the project's lists. */
async function openFirst(page: Page, list: 'runs' | 'analyses' | 'corrections'): Promise<void> {
  await page.goto(await firstEntryAddress(page, await demoAddress(page), list))
  if (list === 'corrections') await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
  else await benchIsDrawn(page)
}

function memberEntry(name: string, list: 'runs' | 'analyses' | 'corrections'): Screen {
  return { name, who: 'owner', open: (page) => openFirst(page, list) }
}

/** What opens on the newest analysis of the demo. */
function overAnalysis(name: string, open: (page: Page) => Promise<void>): Screen {
  return {
    name,
    who: 'owner',
    open: async (page) => {
      await openFirst(page, 'analyses')
      await open(page)
    },
  }
}

/** What opens on a page of the demo's project. */
function over(name: string, subPath: string, open: (page: Page) => Promise<void>): Screen {
  return {
    name,
    who: 'owner',
    open: async (page) => {
      await page.goto((await demoAddress(page)) + subPath)
      await open(page)
    },
  }
}

async function dialogIsOpen(page: Page, name: string | RegExp): Promise<void> {
  const dialog = page.getByRole('dialog', { name })
  await expect(dialog).toBeVisible()
  await expect(dialog.getByText(/^(Getting|Looking up)/)).toHaveCount(0)
}

/** Dialogs, panels and forms that stand open over a screen. */
const openedThings: Screen[] = [
  {
    name: 'saving needs an account',
    who: null,
    open: async (page) => {
      await page.goto('/bench?sample=1')
      await benchIsDrawn(page)
      await page.getByRole('button', { name: 'Save analysis' }).click()
      await dialogIsOpen(page, 'Saving needs an account')
    },
  },
  {
    name: 'saving what is on the open bench',
    who: 'owner',
    open: async (page) => {
      await page.goto('/bench?sample=1')
      await benchIsDrawn(page)
      await page.getByRole('button', { name: 'Save analysis' }).click()
      await dialogIsOpen(page, 'Save this analysis')
      const dialog = page.getByRole('dialog')
      await dialog.getByLabel('Project', { exact: true }).selectOption('new')
      await dialog.getByLabel('Name of the new project').fill('')
      await dialog.getByRole('button', { name: 'Save' }).click()
      await expect(dialog.getByText('Give it a name')).toBeVisible()
    },
  },
  overAnalysis('new name of an analysis', async (page) => {
    await page.getByRole('button', { name: 'Rename' }).click()
    await dialogIsOpen(page, 'Rename this analysis')
  }),
  overAnalysis('note in which a member is named', async (page) => {
    const track = page.getByRole('region', { name: 'Track' })
    await track.getByRole('button', { name: 'Add a note' }).click()
    await track.getByRole('textbox', { name: 'Note' }).pressSequentially('Please look, @')
    await expect(track.getByRole('listbox', { name: 'Members to name' }).getByRole('option')).not.toHaveCount(0)
  }),
  overAnalysis('note that is to be removed', async (page) => {
    const text = `To be looked at ${Date.now()}`
    await addWholeNote(page, text)
    await noteWith(page, text).getByRole('button', { name: 'Remove' }).click()
    await dialogIsOpen(page, 'Remove this note?')
  }),
  {
    name: 'what is known of a run',
    who: 'owner',
    open: async (page) => {
      await openFirst(page, 'runs')
      await page.getByRole('button', { name: 'Change what is known' }).click()
      await dialogIsOpen(page, 'What is known of this run')
    },
  },
  over('invitation with a fault, as an owner', '/people', async (page) => {
    await page.getByLabel('Role', { exact: true }).selectOption('owner')
    await page.getByRole('button', { name: 'Send the invitation' }).click()
    await expect(page.getByLabel('E-mail')).toHaveAttribute('aria-invalid', 'true')
    await expect(page.getByText('An owner can do all that you can')).toBeVisible()
  }),
  over('change of a role', '/people', async (page) => {
    await page.getByLabel(`Role of ${demoPerson('viewer').displayName}`).selectOption('owner')
    await dialogIsOpen(page, /^Make .* an owner\?$/)
  }),
  over('the only owner', '/people', async (page) => {
    await page.getByRole('button', { name: 'Leave' }).click()
    await dialogIsOpen(page, 'You are the only owner')
  }),
  over('member who is to be removed', '/people', async (page) => {
    await page.getByRole('button', { name: `Remove ${demoPerson('viewer').displayName}` }).click()
    await dialogIsOpen(page, /^Remove /)
  }),
  over('invitation that is to be revoked', '/people', async (page) => {
    const email = newAddress('guest')
    await page.getByLabel('E-mail').fill(email)
    await page.getByRole('button', { name: 'Send the invitation' }).click()
    await page.getByRole('button', { name: `Revoke the invitation of ${email}` }).click()
    await dialogIsOpen(page, 'Revoke this invitation?')
  }),
  over('new optics with faults', '/settings', async (page) => {
    await page.getByRole('button', { name: 'Add optics' }).click()
    await dialogIsOpen(page, 'New optics')
    await page.getByRole('dialog').getByRole('button', { name: 'Save' }).click()
    await expect(page.getByRole('dialog').locator('[aria-invalid="true"]').first()).toBeVisible()
  }),
  over('deletion of a project', '/settings', async (page) => {
    await page.getByRole('button', { name: 'Delete this project' }).click()
    await dialogIsOpen(page, 'Delete this project for good?')
  }),
  {
    name: 'deletion of an account',
    who: 'viewer',
    open: async (page) => {
      await page.goto('/account')
      await page.getByRole('button', { name: 'Delete my account', exact: true }).click()
      await dialogIsOpen(page, 'Delete your account for good')
    },
  },
]

const screens: Screen[] = [
  visit('landing', '/'),
  visit('sign-in', '/sign-in'),
  visit('sign-up', '/sign-up'),
  {
    name: 'local mail',
    who: null,
    open: async (page) => {
      await page.goto('/local-mail')
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
      await expect(page.getByText('Getting the')).toHaveCount(0)
    },
  },
  {
    name: 'sign-up, waiting for the mail',
    who: null,
    open: async (page) => {
      await page.goto('/sign-up')
      await askToSignUp(page, newcomer())
    },
  },
  {
    name: 'link of a sign-up in another browser',
    who: null,
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
    who: null,
    open: async (page) => {
      const bench = new BenchPage(page)
      await bench.open()
      await bench.choose(visitorRecording().file)
      await expect(bench.title).toHaveText('Which column is what?')
    },
  },
  {
    name: 'bench with the sample run',
    who: null,
    open: async (page) => {
      await page.goto('/bench?sample=1')
      await benchIsDrawn(page)
    },
  },
  {
    name: 'projects',
    who: 'owner',
    open: async (page) => {
      await page.goto('/projects')
      await expect(page.getByRole('link', { name: HILLSIDE }).first()).toBeVisible()
    },
  },
  { ...visit('new project', '/projects/new'), who: 'owner' },
  { ...visit('import of an archive', '/projects/import'), who: 'owner' },
  { ...visit('account', '/account'), who: 'owner' },
  memberVisit('overview', ''),
  memberVisit('drive train', '/drive'),
  memberVisit('runs', '/runs'),
  memberVisit('new run', '/runs/new'),
  memberEntry('run', 'runs'),
  memberVisit('analyses', '/analyses'),
  memberEntry('analysis', 'analyses'),
  memberVisit('corrections', '/corrections'),
  overAnalysis('share links', async (page) => {
    const panel = new SharePanel(page)
    await panel.open()
    await panel.make('To look at')
  }),
  overAnalysis('form of a new share link', async (page) => {
    await new SharePanel(page).open()
    const another = page.getByRole('button', { name: 'Make another link' })
    const send = page.getByRole('button', { name: 'Make the link' })
    await expect(another.or(send)).toBeVisible()
    if (await another.isVisible()) await another.click()
    await expect(send).toBeVisible()
  }),
  overAnalysis('report', async (page) => {
    const panel = new SharePanel(page)
    await panel.open()
    await page.goto(await panel.make('To look at'))
    await reportIsDrawn(page)
  }),
  {
    name: 'report of a saved analysis',
    who: 'owner',
    open: async (page) => {
      await page.goto(`${await firstEntryAddress(page, await demoAddress(page), 'analyses')}/report`)
      await reportIsDrawn(page)
    },
  },
  memberEntry('correction', 'corrections'),
  memberVisit('people', '/people'),
  memberVisit('settings', '/settings'),
  memberVisit('log of the project', '/settings/trail'),
  memberVisit('runs, none of which matches', '/runs?q=no-such-run'),
  ...openedThings,
]

/** On a phone the filters of a list are folded away behind a button; they are looked at unfolded. */
async function unfoldFilters(page: Page): Promise<void> {
  const filters = page.getByRole('button', { name: /^Filters/, expanded: false })
  if (await filters.isVisible()) await filters.click()
}

/** How many pixels the page, or a dialog that stands over it, could be moved sideways by. */
function sidewaysPixels(page: Page): Promise<number[]> {
  return page.evaluate(() => [
    document.documentElement.scrollWidth - window.innerWidth,
    ...[...document.querySelectorAll('dialog[open]')].map((dialog) => dialog.scrollWidth - dialog.clientWidth),
  ])
}

for (const screen of screens) {
  test(`${screen.name}: accessible in Day and Dusk, only red in Night`, async ({ page, context }) => {
    const consoleFaults: string[] = []
    page.on('console', (message) => {
      if (message.type() === 'error' || message.type() === 'warning') consoleFaults.push(message.text())
    })
    page.on('pageerror', (error) => consoleFaults.push(String(error)))
    if (screen.who) await enterAs(context, screen.who)
    await screen.open(page)
    for (const theme of ['day', 'dusk'] as const) {
      await showTheme(page, theme)
      await expectNoAxeViolations(page, `${screen.name}, ${theme}`)
    }
    await showTheme(page, 'night')
    await expectOnlyRedPixels(page, `${screen.name} at 1440`)
    await page.setViewportSize({ width: 390, height: 844 })
    await unfoldFilters(page)
    await expectOnlyRedPixels(page, `${screen.name} at 390`)
    const sideways = await sidewaysPixels(page)
    expect(Math.max(...sideways), `${screen.name} can be moved sideways on a phone by`).toBeLessThanOrEqual(0)
    const expected404 = screen.name === 'not-found' ? 1 : 0
    expect(consoleFaults.filter((text) => !/404/.test(text) || !expected404)).toEqual([])
  })
}
