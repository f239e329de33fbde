import { cleanup, render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, describe, expect, test } from 'vitest'
import { DataTable } from '@/components/ui/data-table'
import { compareValues, rowMatches, type DataColumn } from '@/components/ui/data-table-model'

afterEach(cleanup)

interface Row {
  name: string
  swing: number | null
}

const columns: readonly DataColumn<Row>[] = [
  { id: 'name', header: 'Name', value: ({ name }) => name, cell: ({ name }) => <a href={`#${name}`}>{name}</a> },
  { id: 'swing', header: 'Swing', isNumeric: true, value: ({ swing }) => swing },
]
const rows: Row[] = [
  { name: 'run 10', swing: 9.5 },
  { name: 'run 2', swing: null },
  { name: 'run 1', swing: 16 },
  { name: 'run 3', swing: 10.25 },
  { name: 'cloudy run', swing: 2 },
  { name: 'last run', swing: 15 },
]

function show(pageSize = 25) {
  render(<DataTable caption="runs" columns={columns} rows={rows} rowId={({ name }) => name} pageSize={pageSize} />)
  return userEvent.setup()
}

const shownNames = () => screen.getAllByRole('rowheader').map((cell) => cell.textContent)

describe('DataTable', () => {
  test('sorts numbers by size both ways, with what is missing at the end', async () => {
    const user = show()
    const head = screen.getByRole('columnheader', { name: /Swing/ })
    await user.click(within(head).getByRole('button'))
    const first = shownNames()
    await user.click(within(head).getByRole('button'))
    const second = shownNames()
    const rising = ['cloudy run', 'run 10', 'run 3', 'last run', 'run 1']
    expect([first.slice(0, 5), second.slice(0, 5)]).toEqual(
      head.getAttribute('aria-sort') === 'ascending' ? [rising.toReversed(), rising] : [rising, rising.toReversed()],
    )
    expect([first.at(-1), second.at(-1)]).toEqual(['run 2', 'run 2'])
  })

  test('orders names as people count', async () => {
    const user = show()
    await user.click(screen.getByRole('button', { name: 'Name' }))
    expect(shownNames()).toEqual(['cloudy run', 'last run', 'run 1', 'run 2', 'run 3', 'run 10'])
  })

  test('filters by every word, says so when nothing is left, and shows all again', async () => {
    const user = show()
    await user.type(screen.getByRole('searchbox'), 'run cloud')
    expect(shownNames()).toEqual(['cloudy run'])
    await user.type(screen.getByRole('searchbox'), 'x')
    expect(screen.queryAllByRole('rowheader')).toEqual([])
    await user.click(screen.getByRole('button', { name: 'Show all 6' }))
    expect(shownNames()).toHaveLength(6)
  })

  test('pages, and the ends are shut', async () => {
    const user = show(4)
    expect(shownNames()).toHaveLength(4)
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Back' }).disabled).toBe(true)
    await user.click(screen.getByRole('button', { name: 'Next' }))
    expect(shownNames()).toEqual(['cloudy run', 'last run'])
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Next' }).disabled).toBe(true)
  })

  test('arrow keys move between the rows', async () => {
    const user = show()
    screen.getByRole('link', { name: 'run 10' }).focus()
    await user.keyboard('{ArrowDown}')
    expect(document.activeElement?.textContent).toBe('run 2')
    await user.keyboard('{End}')
    expect(document.activeElement?.textContent).toBe('last run')
    await user.keyboard('{ArrowDown}{Home}')
    expect(document.activeElement?.textContent).toBe('run 10')
  })
})

test('compareValues: numbers by size, text by its numbers', () => {
  expect([10, 9, 100].sort(compareValues)).toEqual([9, 10, 100])
  expect(['run 10', 'Run 9'].sort(compareValues)).toEqual(['Run 9', 'run 10'])
})

test('rowMatches looks at every column and needs every word', () => {
  expect(rowMatches(rows[0], columns, '9.5 RUN')).toBe(true)
  expect(rowMatches(rows[0], columns, '9.5 cloudy')).toBe(false)
})
