import { cleanup, render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { afterEach, describe, expect, test, vi } from 'vitest'
import { FilterRow, FilterSelect } from '@/components/ui/filter-row'
import { ServerTable } from '@/components/ui/server-table'
import type { ListColumn } from '@/components/ui/server-table-model'

afterEach(cleanup)

interface Row {
  id: string
  name: string
  size: number
}

const columns: readonly ListColumn<Row>[] = [
  { id: 'name', header: 'Name', cell: ({ name }) => <a href={`#${name}`}>{name}</a> },
  { id: 'size', header: 'Size', isNumeric: true, startsDescending: true, cell: ({ size }) => size },
  { id: 'note', header: 'Note', isSortable: false, cell: () => 'none' },
]
const rowsFrom = (first: number): Row[] =>
  [0, 1, 2].map((step) => ({ id: `id-${first + step}`, name: `run ${first + step}`, size: first + step }))

type Props = Parameters<typeof ServerTable<Row>>[0]

function props(given: Partial<Props> = {}): Props {
  return {
    caption: 'runs',
    columns,
    rows: rowsFrom(1),
    rowId: ({ id }) => id,
    sort: { id: 'name', desc: false },
    onSort: vi.fn(),
    page: { nextCursor: 'on', previousCursor: null, total: 90, before: 0 },
    onCursor: vi.fn(),
    pageSize: 25,
    pageSizes: [25, 50, 100],
    onPageSize: vi.fn(),
    isBusy: false,
    ...given,
  }
}

const button = (name: string) => screen.getByRole<HTMLButtonElement>('button', { name })

describe('ServerTable', () => {
  test('says by what it is sorted and asks for another order, the largest first where that is usual', async () => {
    const given = props()
    render(<ServerTable {...given} />)
    const sorts = screen.getAllByRole('columnheader').map((head) => head.getAttribute('aria-sort'))
    expect(sorts).toEqual(['ascending', null, null])
    await userEvent.click(button('Name'))
    expect(given.onSort).toHaveBeenLastCalledWith({ id: 'name', desc: true })
    await userEvent.click(button('Size'))
    expect(given.onSort).toHaveBeenLastCalledWith({ id: 'size', desc: true })
    expect(screen.queryByRole('button', { name: 'Note' })).toBeNull()
  })

  test('shows the rows in the order in which they come, and where they lie', () => {
    render(<ServerTable {...props({ rows: rowsFrom(7).reverse(), page: { ...props().page, before: 50 } })} />)
    expect(screen.getAllByRole('rowheader').map((cell) => cell.textContent)).toEqual(['run 9', 'run 8', 'run 7'])
    expect(screen.getByText('51–53').parentElement?.textContent).toBe('51–53 of 90')
  })

  test('Back and Next follow the cursors, and the ends are shut', async () => {
    const first = props()
    const { rerender } = render(<ServerTable {...first} />)
    expect(button('Back').disabled).toBe(true)
    await userEvent.click(button('Next'))
    expect(first.onCursor).toHaveBeenLastCalledWith('on')
    const last = props({ page: { nextCursor: null, previousCursor: 'back', total: 90, before: 87 } })
    rerender(<ServerTable {...last} />)
    expect(button('Next').disabled).toBe(true)
    await userEvent.click(button('Back'))
    expect(last.onCursor).toHaveBeenLastCalledWith('back')
  })

  test('the size of a page can be chosen; a short list has no pages', async () => {
    const given = props()
    const { rerender } = render(<ServerTable {...given} />)
    await userEvent.click(screen.getByRole('radio', { name: '100' }))
    expect(given.onPageSize).toHaveBeenLastCalledWith(100)
    rerender(<ServerTable {...props({ page: { nextCursor: null, previousCursor: null, total: 3, before: 0 } })} />)
    expect(screen.queryByRole('navigation')).toBeNull()
  })

  test('the rows before stay, marked as busy, until the next ones are there; nobody pages on from them', async () => {
    const busy = props({ isBusy: true })
    const { rerender } = render(<ServerTable {...busy} />)
    expect(screen.getByRole('table').getAttribute('aria-busy')).toBe('true')
    expect(screen.getAllByRole('rowheader')).toHaveLength(3)
    await userEvent.click(button('Next'))
    expect(busy.onCursor).not.toHaveBeenCalled()
    rerender(<ServerTable {...props()} />)
    expect(screen.getByRole('table').getAttribute('aria-busy')).toBe('false')
  })

  test('arrow keys, Home and End go from row to row', async () => {
    render(<ServerTable {...props()} />)
    const user = userEvent.setup()
    screen.getByRole('link', { name: 'run 1' }).focus()
    for (const [key, name] of [
      ['ArrowDown', 'run 2'],
      ['End', 'run 3'],
      ['ArrowDown', 'run 3'],
      ['ArrowUp', 'run 2'],
      ['Home', 'run 1'],
    ]) {
      await user.keyboard(`{${key}}`)
      expect(document.activeElement?.textContent).toBe(name)
    }
  })

  test('PageDown turns the page and goes on with its first row; PageUp on the first page does nothing', async () => {
    const given = props()
    const { rerender } = render(<ServerTable {...given} />)
    const user = userEvent.setup()
    screen.getByRole('link', { name: 'run 3' }).focus()
    await user.keyboard('{PageUp}')
    expect(given.onCursor).not.toHaveBeenCalled()
    await user.keyboard('{PageDown}')
    expect(given.onCursor).toHaveBeenLastCalledWith('on')
    rerender(<ServerTable {...given} isBusy />)
    rerender(<ServerTable {...props({ rows: rowsFrom(4) })} />)
    expect(document.activeElement?.textContent).toBe('run 4')
  })

  test('without rows it shows what to do', () => {
    const page = { nextCursor: null, previousCursor: null, total: 0, before: 0 }
    render(<ServerTable {...props({ rows: [], page, empty: <p>No run matches</p> })} />)
    expect(screen.getByText('No run matches')).toBeTruthy()
    expect(screen.queryByRole('table')).toBeNull()
  })
})

describe('FilterRow', () => {
  function Filters({ onText }: { onText: (text: string) => void }) {
    const [text, setText] = useState('')
    const [sense, setSense] = useState<'proven' | 'assumed'>()
    return (
      <>
        <FilterRow
          label="Filter runs"
          placeholder="name"
          text={text}
          onText={(next) => {
            onText(next)
            setText(next)
          }}
          setCount={sense ? 1 : 0}
        >
          <FilterSelect
            label="Sense"
            value={sense}
            options={[
              { value: 'proven', label: 'proven' },
              { value: 'assumed', label: 'assumed' },
            ]}
            onValue={setSense}
          />
        </FilterRow>
        <button type="button" onClick={() => setText('')}>
          Show all
        </button>
      </>
    )
  }

  test('hands the text on once the typing pauses, and empties when all is shown again', async () => {
    const onText = vi.fn()
    render(<Filters onText={onText} />)
    const box = screen.getByRole<HTMLInputElement>('searchbox')
    await userEvent.type(box, 'night 2')
    await vi.waitFor(() => expect(onText).toHaveBeenCalled())
    expect(onText.mock.calls).toEqual([['night 2']])
    await userEvent.click(button('Show all'))
    expect(box.value).toBe('')
    await userEvent.type(box, 'x')
    await vi.waitFor(() => expect(onText).toHaveBeenLastCalledWith('x'))
  })

  test('a phone unfolds the further filters and says how many are set', async () => {
    render(<Filters onText={vi.fn()} />)
    const fold = button('Filters')
    expect(fold.getAttribute('aria-expanded')).toBe('false')
    await userEvent.click(fold)
    expect(fold.getAttribute('aria-expanded')).toBe('true')
    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Sense' }), 'assumed')
    expect(fold.textContent).toBe('Filters (1)')
    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Sense' }), '')
    expect(fold.textContent).toBe('Filters')
  })
})
