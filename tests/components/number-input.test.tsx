import { cleanup, render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { afterEach, expect, test, vi } from 'vitest'
import { focusFirstInvalid } from '@/components/ui/focus-first-invalid'
import { NumberField } from '@/components/ui/number-input'

afterEach(cleanup)

function Teeth({ onValue }: { onValue: (value: number | null) => void }) {
  const [value, setValue] = useState<number | null>(152)
  return (
    <form aria-label="form">
      <NumberField
        label="Teeth"
        value={value}
        onValue={(next) => {
          setValue(next)
          onValue(next)
        }}
        isInteger
        isRequired
        min={1}
        max={1000}
      />
    </form>
  )
}

test('gives every readable number and keeps what can’t be read, with its fault beside the field', async () => {
  const onValue = vi.fn()
  const user = userEvent.setup()
  render(<Teeth onValue={onValue} />)
  const field = screen.getByLabelText<HTMLInputElement>('Teeth')

  await user.clear(field)
  expect(screen.getByRole('alert').textContent).toContain('Type a number')
  expect(onValue).not.toHaveBeenCalled()

  await user.type(field, '18x')
  await user.tab()
  expect(field.value).toBe('18x')
  expect(field.getAttribute('aria-invalid')).toBe('true')
  expect(screen.getByRole('alert').textContent).toContain('This is not a number')
  expect(onValue.mock.calls).toEqual([[1], [18]])

  await user.clear(field)
  await user.type(field, '144')
  await user.tab()
  expect(onValue).toHaveBeenLastCalledWith(144)
  expect(screen.queryByRole('alert')).toBeNull()
})

test.each([
  ['0', 'At least 1'],
  ['1001', 'At most 1000'],
  ['1.5', 'A whole number, please'],
])('refuses %s: %s', async (typed, fault) => {
  const user = userEvent.setup()
  render(<Teeth onValue={() => {}} />)
  const field = screen.getByLabelText('Teeth')
  await user.clear(field)
  await user.type(field, typed)
  expect(screen.getByRole('alert').textContent).toContain(fault)
})

test('a form finds the field that may not be sent, and sends when there is none', async () => {
  const user = userEvent.setup()
  render(<Teeth onValue={() => {}} />)
  const form = screen.getByRole<HTMLFormElement>('form')
  expect(focusFirstInvalid(form)).toBe(false)
  await user.clear(screen.getByLabelText('Teeth'))
  await user.click(document.body)
  expect(focusFirstInvalid(form)).toBe(true)
  expect(document.activeElement).toBe(screen.getByLabelText('Teeth'))
})
