import { act, cleanup, render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest'
import { NoteLinkProvider } from '@/components/notes/note-link'
import { NoteList } from '@/components/notes/note-list'
import type { NoteActions } from '@/components/notes/note-types'
import { useNewNote } from '@/components/notes/use-new-note'
import { RequestError } from '@/lib/client/fetcher'
import type { Note } from '@/lib/schemas/api'
import { exampleNotes } from '../support/example-outcome'

const MIRA = { userId: '5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e11', displayName: 'Mira Okafor' }
const MILO = { userId: '5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e12', displayName: 'Milo Arden' }
const INES = { userId: '5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e13', displayName: 'Inés Calloway' }
const PEOPLE = [MIRA, MILO, INES]

const [first] = exampleNotes()
const settled: Note = { ...first, resolvedAt: '2031-11-16T08:00:00.000Z', resolvedByName: 'Tomas' }

function Notes({ notes = [], actions }: { notes?: Note[]; actions: NoteActions }) {
  const newNote = useNewNote('time', actions)
  return (
    <NoteLinkProvider>
      <NoteList
        listId="notes-time"
        kind="time"
        notes={notes.map((note, index) => ({ number: index + 1, note }))}
        actions={{ presentIds: notes.map(({ id }) => id), ...actions }}
      />
      {newNote.element({ kind: 'time', timeSeconds: 90 })}
    </NoteLinkProvider>
  )
}

beforeEach(() => window.sessionStorage.clear())
afterEach(cleanup)

const area = () => screen.getByRole<HTMLTextAreaElement>('textbox', { name: 'Note' })
const options = () => screen.queryAllByRole('option').map(({ textContent }) => textContent)

async function writeNew(actions: NoteActions, text: string) {
  const user = userEvent.setup()
  render(<Notes actions={{ people: PEOPLE, ...actions }} />)
  await user.click(screen.getByRole('button', { name: 'Add a note' }))
  await user.type(area(), text)
  return user
}

describe('naming a member', () => {
  test('“@” offers everyone, what follows narrows the list, without regard to case and accents', async () => {
    const user = await writeNew({ onAdd: vi.fn() }, 'Ask @')
    expect(options()).toEqual(['Mira Okafor', 'Milo Arden', 'Inés Calloway'])
    await user.type(area(), 'mi')
    expect(options()).toEqual(['Mira Okafor', 'Milo Arden'])
    await user.type(area(), 'x')
    expect(options()).toEqual([])
    await user.type(area(), '{Backspace>3/}ines')
    expect(options()).toEqual(['Inés Calloway'])
  })

  test('arrow keys choose, the focus stays in the text, Enter takes the name', async () => {
    const onAdd = vi.fn()
    const user = await writeNew({ onAdd }, 'Ask @mi')
    const activeText = () =>
      document.getElementById(area().getAttribute('aria-activedescendant') ?? '')?.textContent ?? null
    expect(activeText()).toBe('Mira Okafor')
    await user.keyboard('{ArrowDown}')
    expect(activeText()).toBe('Milo Arden')
    await user.keyboard('{ArrowDown}')
    expect(activeText()).toBe('Mira Okafor')
    await user.keyboard('{ArrowUp}{Enter}')
    expect(area().value).toBe('Ask @Milo Arden ')
    expect(document.activeElement).toBe(area())
    expect(options()).toEqual([])
    await user.keyboard('please')
    await user.click(screen.getByRole('button', { name: 'Add note' }))
    expect(onAdd).toHaveBeenCalledWith({
      anchor: { kind: 'time', timeSeconds: 90 },
      text: 'Ask @Milo Arden please',
      mentions: [MILO.userId],
    })
  })

  test('Escape closes the list and keeps the text; Enter is a new line then', async () => {
    const user = await writeNew({ onAdd: vi.fn() }, 'Ask @mi{Escape}')
    expect(options()).toEqual([])
    expect(area().getAttribute('aria-activedescendant')).toBeNull()
    await user.keyboard('r{Enter}')
    expect(area().value).toBe('Ask @mir\n')
  })

  test('a tap takes the name', async () => {
    const user = await writeNew({ onAdd: vi.fn() }, '@')
    await user.click(screen.getByRole('option', { name: 'Inés Calloway' }))
    expect(area().value).toBe('@Inés Calloway ')
    expect(document.activeElement).toBe(area())
  })

  test('taking the name out of the text takes the mention away', async () => {
    const onAdd = vi.fn()
    const user = await writeNew({ onAdd }, '@mira{Enter}')
    await user.clear(area())
    await user.type(area(), 'Nobody')
    await user.click(screen.getByRole('button', { name: 'Add note' }))
    expect(onAdd.mock.calls[0][0].mentions).toEqual([])
  })

  test('an address of a mailbox offers nobody', async () => {
    await writeNew({ onAdd: vi.fn() }, 'mail mira@')
    expect(options()).toEqual([])
  })
})

describe('a note', () => {
  test('says who wrote it, when and where, and who changed it; markup is text', () => {
    const note: Note = {
      ...first,
      text: '<b>@Mira Okafor</b>, look',
      mentions: [MIRA],
      updatedAt: '2031-11-17T10:00:00.000Z',
      updatedByName: 'Tomas',
    }
    render(<Notes notes={[note]} actions={{}} />)
    const item = screen.getByRole('listitem')
    expect(item.textContent).toContain('<b>@Mira Okafor</b>, look')
    expect(item.querySelector('b')).toBeNull()
    expect(item.querySelector('strong')?.textContent).toBe('@Mira Okafor')
    expect(item.textContent).toMatch(/Mira, 15 Nov, .*at 24/)
    expect(item.textContent).toMatch(/changed 17 Nov, .*by Tomas/)
    expect(screen.queryByRole('button')).toBeNull()
  })

  test('once settled folds to one line, and can be taken up again', async () => {
    const user = userEvent.setup()
    const onResolve = vi.fn()
    render(<Notes notes={[settled, { ...settled, id: exampleNotes()[1].id }]} actions={{ onResolve }} />)
    expect(screen.getByText('Two settled notes')).toBeTruthy()
    expect(screen.queryByText(/Cloud took/)).toBeNull()
    await user.click(screen.getByRole('button', { name: 'show' }))
    const items = within(screen.getByRole('list', { name: 'Settled notes' })).getAllByRole('listitem')
    expect(items[0].textContent).toMatch(/settled 16 Nov, .*by Tomas/)
    await user.click(within(items[0]).getByRole('button', { name: 'Take up again' }))
    expect(onResolve).toHaveBeenCalledWith(settled, false)
  })

  test('is removed only after a question', async () => {
    const user = userEvent.setup()
    const onDelete = vi.fn()
    render(<Notes notes={[first]} actions={{ onDelete }} />)
    await user.click(screen.getByRole('button', { name: 'Remove' }))
    const dialog = within(screen.getByRole('dialog', { name: 'Remove this note?' }))
    await user.click(dialog.getByRole('button', { name: 'Keep it' }))
    expect(onDelete).not.toHaveBeenCalled()
    await user.click(screen.getByRole('button', { name: 'Remove' }))
    await user.click(within(screen.getByRole('dialog')).getByRole('button', { name: 'Remove' }))
    expect(onDelete).toHaveBeenCalledWith(first)
    await waitFor(() => expect(document.activeElement?.id).toBe('notes-time'))
  })

  test('of somebody else can be settled, not changed or removed', () => {
    const actions = { onChange: vi.fn(), onDelete: vi.fn(), onResolve: vi.fn(), canChange: () => false }
    render(<Notes notes={[first]} actions={actions} />)
    expect(screen.getAllByRole('button').map(({ textContent }) => textContent)).toEqual(['Settle'])
  })
})

describe('what was typed is never lost', () => {
  async function changeTo(text: string, actions: NoteActions, notes = [first]) {
    const user = userEvent.setup()
    const view = render(<Notes notes={notes} actions={{ people: PEOPLE, ...actions }} />)
    await user.click(screen.getByRole('button', { name: 'Change' }))
    await user.clear(area())
    await user.type(area(), text)
    return { user, view }
  }

  const refused = (refusal: ConstructorParameters<typeof RequestError>[1]) => new RequestError('Refused.', refusal)
  const theirs: Note = { ...first, version: 2, text: 'Theirs', updatedByName: 'Tomas' }
  const conflict = refused({
    status: 409,
    code: 'changed-meanwhile',
    changedBy: 'Tomas',
    changedAt: '2031-11-17T10:00:00.000Z',
    current: theirs,
  })

  test('somebody else changed the note: theirs stands beside mine, and mine can be kept', async () => {
    const onChange = vi.fn().mockRejectedValueOnce(conflict).mockResolvedValueOnce(undefined)
    const { user } = await changeTo('Mine', { onChange })
    await user.click(screen.getByRole('button', { name: 'Save' }))
    expect(await screen.findByText(/^Tomas changed this note meanwhile, 17 Nov/)).toBeTruthy()
    expect(screen.getByText('Theirs')).toBeTruthy()
    expect(area().value).toBe('Mine')
    await user.click(screen.getByRole('button', { name: 'Save mine instead' }))
    expect(onChange.mock.calls.map(([from, { text }]) => [from.version, text])).toEqual([
      [1, 'Mine'],
      [2, 'Mine'],
    ])
    await waitFor(() => expect(screen.queryByRole('textbox')).toBeNull())
  })

  test('or theirs taken', async () => {
    const onChange = vi.fn().mockRejectedValueOnce(conflict)
    const { user } = await changeTo('Mine', { onChange })
    await user.click(screen.getByRole('button', { name: 'Save' }))
    await user.click(await screen.findByRole('button', { name: 'Take theirs' }))
    expect(screen.queryByRole('textbox')).toBeNull()
    expect(onChange).toHaveBeenCalledOnce()
  })

  test('a newer note that arrives does not disturb the open editor, and is not overwritten unseen', async () => {
    const onChange = vi.fn().mockResolvedValue(undefined)
    const { user, view } = await changeTo('Mine', { onChange })
    view.rerender(<Notes notes={[theirs]} actions={{ people: PEOPLE, onChange }} />)
    expect(area().value).toBe('Mine')
    await user.click(screen.getByRole('button', { name: 'Save' }))
    expect(onChange.mock.calls[0][0].version).toBe(1)
  })

  test('somebody removed the note: mine can become a new one', async () => {
    const onAdd = vi.fn()
    const onChange = vi.fn().mockRejectedValue(refused({ status: 404, code: 'not-found' }))
    const { user, view } = await changeTo('Mine', { onChange, onAdd })
    await user.click(screen.getByRole('button', { name: 'Save' }))
    expect(await screen.findByText('Somebody removed this note meanwhile')).toBeTruthy()
    view.rerender(<Notes notes={[]} actions={{ people: PEOPLE, onChange, onAdd }} />)
    expect(area().value).toBe('Mine')
    await user.click(screen.getByRole('button', { name: 'Add mine as a new note' }))
    expect(onAdd).toHaveBeenCalledWith({ anchor: first.anchor, text: 'Mine', mentions: [] })
    expect(onChange).toHaveBeenCalledOnce()
  })

  test('the session has ended: the text stays, and a way to sign in is there', async () => {
    const onAdd = vi.fn().mockRejectedValue(refused({ status: 401, code: 'not-signed-in' }))
    const user = await writeNew({ onAdd }, 'Calm')
    await user.click(screen.getByRole('button', { name: 'Add note' }))
    expect(await screen.findByRole('link', { name: 'Sign in in another tab' })).toBeTruthy()
    expect(area().value).toBe('Calm')
  })

  test('after a reload it is back, with a hint; Cancel lets it go', async () => {
    await writeNew({ onAdd: vi.fn(), draftScope: 'a' }, 'Half a sen')
    cleanup()
    render(<Notes actions={{ onAdd: vi.fn(), draftScope: 'b' }} />)
    expect(screen.queryByRole('textbox')).toBeNull()
    cleanup()
    render(<Notes actions={{ onAdd: vi.fn(), draftScope: 'a' }} />)
    expect(area().value).toBe('Half a sen')
    expect(screen.getByText(/What you were writing here before is back/)).toBeTruthy()
    act(() => screen.getByRole('button', { name: 'Cancel' }).click())
    cleanup()
    render(<Notes actions={{ onAdd: vi.fn(), draftScope: 'a' }} />)
    expect(screen.queryByRole('textbox')).toBeNull()
  })

  test('the focus returns to the note after a change, to “Add a note” after a new one', async () => {
    const { user } = await changeTo('Mine', { onChange: vi.fn(), onAdd: vi.fn() })
    await user.click(screen.getByRole('button', { name: 'Save' }))
    await waitFor(() => expect(document.activeElement?.id).toBe(`note-${first.id}`))
    await user.click(screen.getByRole('button', { name: 'Add a note' }))
    await user.click(screen.getByRole('button', { name: 'Cancel' }))
    await waitFor(() => expect(document.activeElement?.textContent).toBe('Add a note'))
  })
})
