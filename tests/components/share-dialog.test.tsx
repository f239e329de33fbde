import { cleanup, render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, beforeEach, expect, test, vi } from 'vitest'
import { SWRConfig } from 'swr'
import { ShareButton } from '@/components/share/share-dialog'
import type { ShareLink, ShareLinkChange } from '@/lib/schemas/share'
import { exampleNotes } from '../support/example-outcome'

const [first, second] = exampleNotes()
const link: ShareLink = {
  id: '9d2b9a0c-7d60-4f2b-8f0a-3a1f5a0e7b31',
  version: 3,
  token: 'A'.repeat(43),
  preface: 'Have a look',
  noteIds: [first.id, second.id],
  createdAt: '2031-11-15T19:20:00.000Z',
  createdBy: 'Mira',
  expiresAt: null,
  revokedAt: null,
  openedCount: 0,
  lastOpenedAt: null,
}
/** What somebody else made of it: one note less. */
const theirs: ShareLink = { ...link, version: 4, noteIds: [first.id] }

let sent: [string, ShareLinkChange | null][] = []

beforeEach(() => {
  sent = []
  vi.stubGlobal('fetch', async (_url: string, init: RequestInit = {}) => {
    if (init.method === 'GET') return Response.json({ links: [link] })
    const change: ShareLinkChange | null = init.body ? JSON.parse(String(init.body)) : null
    sent.push([init.method ?? '', change])
    if (change === null) return new Response(null, { status: 204 })
    if (change.version === theirs.version) return Response.json({ ...theirs, ...change, version: 5 })
    const error = { code: 'changed-meanwhile', message: 'This link was changed', current: theirs }
    return Response.json({ error }, { status: 409 })
  })
})

afterEach(() => {
  cleanup()
  vi.unstubAllGlobals()
})

async function open({ isArchived = false } = {}) {
  render(
    <SWRConfig value={{ provider: () => new Map() }}>
      <ShareButton projectId="p" analysisId="a" notes={[first, second]} isArchived={isArchived} />
    </SWRConfig>,
  )
  await userEvent.click(screen.getByRole('button', { name: /^Share/ }))
  await screen.findByRole('button', { name: /^Revoke the link of/ })
}

async function changeWords() {
  await open()
  await userEvent.click(screen.getByRole('button', { name: /^Change the link of/ }))
  await userEvent.type(screen.getByRole('textbox', { name: 'Words to the reader' }), ' at it')
  await userEvent.click(screen.getByRole('button', { name: 'Save' }))
  await screen.findByText(/changed this link meanwhile/)
}

test('what somebody else changed meanwhile is told, and neither text is lost', async () => {
  await changeWords()
  expect(sent).toMatchObject([['PATCH', { version: 3, preface: 'Have a look at it' }]])
  screen.getByText(new RegExp(`shows “${first.text.slice(0, 20)}[^”]*”, and says first: “Have a look”`))
  expect(screen.getByRole<HTMLTextAreaElement>('textbox', { name: 'Words to the reader' }).value).toBe(
    'Have a look at it',
  )
  await userEvent.click(screen.getByRole('button', { name: 'Save mine instead' }))
  await waitFor(() => expect(sent[1]).toMatchObject(['PATCH', { version: 4, preface: 'Have a look at it' }]))
})

test('theirs is taken: the form goes on from it', async () => {
  await changeWords()
  await userEvent.click(screen.getByRole('button', { name: 'Take theirs' }))
  expect(screen.getAllByRole<HTMLInputElement>('checkbox').map(({ checked }) => checked)).toEqual([true, false])
  await userEvent.click(screen.getByRole('button', { name: 'Save' }))
  await waitFor(() => expect(sent[1]).toMatchObject(['PATCH', { version: 4, noteIds: [first.id] }]))
})

test('in an archived project links are revoked, and neither made nor changed', async () => {
  await open({ isArchived: true })
  expect(screen.queryByRole('button', { name: /Make|^Change/ })).toBeNull()
  screen.getByRole('button', { name: 'Close' })
  await userEvent.click(screen.getByRole('button', { name: /^Revoke the link of/ }))
  await userEvent.click(screen.getByRole('button', { name: 'Revoke the link' }))
  await waitFor(() => expect(sent).toEqual([['DELETE', null]]))
})
