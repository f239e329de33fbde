import { cleanup, fireEvent, render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, describe, expect, test, vi } from 'vitest'
import { FileIntake, type IntakeFile } from '@/components/import/file-intake'
import { MAX_FILE_BYTES } from '@/lib/formats/limits'

afterEach(() => {
  cleanup()
  delete document.documentElement.dataset.theme
})

const text = 'time,ra\n0,1\n'
const textOf = (file: IntakeFile) => new TextDecoder().decode(file.bytes)

/** A file that claims a size, without the memory for it. */
function fileOfSize(name: string, size: number): File {
  const file = new File(['0'], name)
  Object.defineProperty(file, 'size', { value: size })
  return file
}

function setUp(props: Partial<Parameters<typeof FileIntake>[0]> = {}) {
  const onFiles = vi.fn<(files: IntakeFile[]) => void>()
  render(<FileIntake onFiles={onFiles} {...props} />)
  return { onFiles, user: userEvent.setup() }
}

describe('FileIntake', () => {
  test('a chosen file is read to its bytes', async () => {
    const { onFiles, user } = setUp()
    await user.upload(screen.getByLabelText('Recording file'), new File([text], 'run.csv'))
    await waitFor(() => expect(onFiles).toHaveBeenCalledOnce())
    const [file] = onFiles.mock.calls[0][0]
    expect(file.fileName).toBe('run.csv')
    expect(textOf(file)).toBe(text)
  })

  test('a dropped file is read; of several only the first unless many are wanted', async () => {
    const files = [new File([text], 'a.csv'), new File([text], 'b.csv')]
    const drop = () => fireEvent.drop(screen.getByText(/^Drop/), { dataTransfer: { files } })
    const one = setUp()
    drop()
    await waitFor(() => expect(one.onFiles).toHaveBeenCalledOnce())
    expect(one.onFiles.mock.calls[0][0].map(({ fileName }) => fileName)).toEqual(['a.csv'])
    cleanup()
    const many = setUp({ isMultiple: true })
    drop()
    await waitFor(() => expect(many.onFiles).toHaveBeenCalledOnce())
    expect(many.onFiles.mock.calls[0][0].map(({ fileName }) => fileName)).toEqual(['a.csv', 'b.csv'])
  })

  test('one byte over 64 MB is refused with the size and the limit; 64 MB are taken', async () => {
    const { onFiles, user } = setUp()
    await user.upload(screen.getByLabelText('Recording file'), fileOfSize('long.csv', MAX_FILE_BYTES + 1))
    const alert = await screen.findByRole('alert')
    expect(alert.textContent).toContain('long.csv was not taken')
    expect(alert.textContent).toContain('67\u202f108\u202f865 bytes')
    expect(onFiles).not.toHaveBeenCalled()
    await user.upload(screen.getByLabelText('Recording file'), fileOfSize('full.csv', MAX_FILE_BYTES))
    await waitFor(() => expect(onFiles).toHaveBeenCalledOnce())
    expect(screen.queryByRole('alert')).toBeNull()
  })

  test('of many files the good ones are taken and the others named', async () => {
    const { onFiles, user } = setUp({ isMultiple: true })
    await user.upload(screen.getByLabelText('Recording files'), [
      new File([text], 'good.csv'),
      fileOfSize('long.csv', MAX_FILE_BYTES + 1),
    ])
    await waitFor(() => expect(onFiles).toHaveBeenCalledOnce())
    expect(onFiles.mock.calls[0][0].map(({ fileName }) => fileName)).toEqual(['good.csv'])
    expect(screen.getByRole('alert').textContent).toContain('long.csv')
  })

  test('a file that the browser cannot read is named', async () => {
    const { onFiles, user } = setUp()
    const file = new File([text], 'folder')
    file.arrayBuffer = () => Promise.reject(new Error('gone'))
    await user.upload(screen.getByLabelText('Recording file'), file)
    expect((await screen.findByRole('alert')).textContent).toContain('folder was not taken')
    expect(onFiles).not.toHaveBeenCalled()
  })

  test('pasted rows are taken; an empty box says what to do and the text stays', async () => {
    const { onFiles, user } = setUp()
    await user.click(screen.getByRole('button', { name: 'Paste text' }))
    await user.click(screen.getByRole('button', { name: 'Use this text' }))
    expect(screen.getByRole('alert').textContent).toContain('Paste the rows first')
    const box = screen.getByLabelText<HTMLTextAreaElement>('Rows of the recording')
    await user.click(box)
    await user.paste(text)
    await user.click(screen.getByRole('button', { name: 'Use this text' }))
    expect(onFiles.mock.calls[0][0].map(textOf)).toEqual([text])
    expect(box.value).toBe(text)
  })

  test('Night warns before the system’s file window; Day opens it at once', async () => {
    const { user } = setUp()
    const opened = vi.fn()
    screen.getByLabelText('Recording file').addEventListener('click', opened)
    await user.click(screen.getByRole('button', { name: 'Choose a file' }))
    expect(opened).toHaveBeenCalledTimes(1)

    document.documentElement.dataset.theme = 'night'
    await user.click(screen.getByRole('button', { name: 'Choose a file' }))
    expect(opened).toHaveBeenCalledTimes(1)
    expect(screen.getByText(/Night cannot tint/)).toBeDefined()
    await user.click(screen.getByRole('button', { name: 'Open it all the same' }))
    expect(opened).toHaveBeenCalledTimes(2)
    expect(screen.queryByText(/Night cannot tint/)).toBeNull()
  })

  test('the sample run is offered where there is one', async () => {
    const onSample = vi.fn()
    const { user } = setUp({ onSample })
    await user.click(screen.getByRole('button', { name: 'Take the sample run' }))
    expect(onSample).toHaveBeenCalledOnce()
    cleanup()
    setUp()
    expect(screen.queryByRole('button', { name: 'Take the sample run' })).toBeNull()
  })

  test('everything is reached by the keyboard in reading order', async () => {
    const { user } = setUp({ onSample: () => {} })
    const reached: (string | null)[] = []
    for (let i = 0; i < 3; i++) {
      await user.tab()
      reached.push(document.activeElement?.textContent ?? null)
    }
    expect(reached).toEqual(['Choose a file', 'Paste text', 'Take the sample run'])
  })
})
