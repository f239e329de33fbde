import { cleanup, render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { SWRConfig } from 'swr'
import { afterEach, expect, test, vi } from 'vitest'
import { SaveDialog } from '@/components/workspace/save-dialog'

afterEach(() => {
  cleanup()
  vi.unstubAllGlobals()
})

const defaults = { projectName: 'My mount', runName: 'First night', analysisName: 'First look' }

function open(answer: Response, onSave: () => Promise<void> = async () => {}) {
  vi.stubGlobal('fetch', async () => answer)
  const onSignedOut = vi.fn()
  render(
    <SWRConfig value={{ provider: () => new Map(), shouldRetryOnError: false }}>
      <SaveDialog
        isOpen
        onClose={() => {}}
        onSignedOut={onSignedOut}
        defaults={defaults}
        onSave={onSave}
        progressText={null}
      />
    </SWRConfig>,
  )
  return { onSignedOut }
}

test('a session that has ended leads to the way through sign-in', async () => {
  const body = { error: { code: 'not-signed-in', message: 'You are not signed in' } }
  const { onSignedOut } = open(Response.json(body, { status: 401 }))
  await waitFor(() => expect(onSignedOut).toHaveBeenCalledOnce())
})

test('what was saved can’t be saved twice while the next page loads', async () => {
  const onSave = vi.fn(async () => {})
  open(Response.json({ projects: [] }), onSave)
  const button = await screen.findByRole('button', { name: 'Save' })
  await userEvent.click(button)
  await userEvent.click(button)
  expect(onSave).toHaveBeenCalledOnce()
  expect(button).toHaveProperty('disabled', true)
})

test('after a fault all is still typed in, and Save works again', async () => {
  const onSave = vi.fn(async () => {})
  onSave.mockRejectedValueOnce(new Error('The server can’t be reached.'))
  open(Response.json({ projects: [] }), onSave)
  const name = await screen.findByLabelText('Name of the analysis')
  await userEvent.clear(name)
  await userEvent.type(name, 'After the rain')
  await userEvent.click(screen.getByRole('button', { name: 'Save' }))
  expect(await screen.findByText('The server can’t be reached.')).toBeTruthy()
  await userEvent.click(screen.getByRole('button', { name: 'Save' }))
  expect(onSave).toHaveBeenLastCalledWith({ ...defaults, analysisName: 'After the rain', projectId: null })
  expect(onSave).toHaveBeenCalledTimes(2)
})
