import { act, cleanup, fireEvent, render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest'
import { Bench, type BenchProps } from '@/components/bench/bench'
import type { Recipe } from '@/lib/analysis/types'
import { DisplayProvider } from '@/lib/client/display'
import { DEFAULT_PREFERENCES } from '@/lib/schemas/preferences'
import { exampleNotes, exampleOutcome, exampleRecipe, exampleResult } from '../support/example-outcome'

// Plotly needs a real browser; the pictures' figures have tests of their own.
vi.mock('@/components/charts/load-plotly', () => ({
  loadedPlotly: () => null,
  loadPlotly: () => new Promise(() => {}),
}))

function Harness({
  initial = exampleRecipe(),
  onRecipe,
  ...props
}: Partial<BenchProps> & { initial?: Recipe; onRecipe?: (recipe: Recipe) => void }) {
  const [recipe, setRecipe] = useState(initial)
  return (
    <Bench
      outcome={exampleOutcome()}
      recipe={recipe}
      onRecipeChange={(next) => {
        setRecipe(next)
        onRecipe?.(next)
      }}
      progress={null}
      isComputing={false}
      onCancel={() => {}}
      runLabel="14 November"
      notes={[]}
      hasWormAngle={false}
      mountCorrection="off"
      isReadOnly={false}
      {...props}
    />
  )
}

beforeEach(() => {
  window.sessionStorage.clear()
  window.history.replaceState(null, '', '/bench')
})
afterEach(() => {
  cleanup()
  vi.useRealTimers()
})

const stage = (name: string) => screen.getByRole('region', { name })

describe('the worksheet', () => {
  test('leads with its finding, five figures and six stages', () => {
    render(<Harness />)
    expect(screen.getByRole('heading', { level: 1 }).textContent).toBe(
      'The worm swings the axis 16.0″ each turn, and repeats well enough to correct',
    )
    expect(screen.getByRole('region', { name: 'Key figures' }).querySelectorAll('dd')).toHaveLength(5)
    expect(screen.getAllByRole('heading', { level: 2 }).map(({ textContent }) => textContent)).toEqual([
      'Track',
      'Spectrum',
      'Harmonics',
      'Turn',
      'Spans',
      'Correction',
    ])
    expect(stage('Harmonics').textContent).toContain('7.350 ± .042')
    expect(screen.getByRole('img', { name: /99\.0.*As a dial/ })).toBeTruthy()
  })

  test('shows saved figures where there are no samples to draw', () => {
    const saved = exampleResult()
    saved.worm!.periodSeconds.value = 566.123
    render(<Harness outcome={null} savedResult={saved} />)
    expect(stage('Key figures').textContent).toContain('566.12')
    expect(stage('Track').textContent).toContain('The figures are those that were saved')
  })

  test('a failure says what is the matter and what to do, and keeps the settings of the track', () => {
    render(<Harness outcome={{ ok: false, reason: 'few-points', needed: 20, got: 5 }} />)
    expect(screen.getByText(/20 are needed, 5 are there/)).toBeTruthy()
    expect(screen.getByLabelText('Declination')).toBeTruthy()
    expect(screen.queryByRole('region', { name: 'Spectrum' })).toBeNull()
  })
})

describe('settings', () => {
  test('change the recipe, can be undone and redone, by button and by key', async () => {
    const user = userEvent.setup()
    const recipes: Recipe[] = []
    render(<Harness onRecipe={(recipe) => recipes.push(recipe)} />)
    await user.selectOptions(screen.getByLabelText('How many'), '3')
    await user.selectOptions(screen.getByLabelText('Window'), 'flat-top')
    expect(recipes.at(-1)).toMatchObject({ harmonicCount: 3, spectrumWindow: 'flat-top' })
    await user.click(screen.getByRole('button', { name: 'Undo' }))
    expect(recipes.at(-1)).toMatchObject({ harmonicCount: 3, spectrumWindow: 'hann' })
    fireEvent.keyDown(window, { key: 'z', ctrlKey: true })
    expect(recipes.at(-1)).toEqual(exampleRecipe())
    fireEvent.keyDown(window, { key: 'Z', ctrlKey: true, shiftKey: true })
    expect(recipes.at(-1)).toMatchObject({ harmonicCount: 3, spectrumWindow: 'hann' })
  })

  test('Kaiser’s window brings a field for its β', async () => {
    const user = userEvent.setup()
    const recipes: Recipe[] = []
    render(<Harness onRecipe={(recipe) => recipes.push(recipe)} />)
    expect(screen.queryByLabelText('Kaiser’s β')).toBeNull()
    await user.selectOptions(screen.getByLabelText('Window'), 'kaiser')
    expect(recipes.at(-1)!.spectrumWindow).toEqual({ kind: 'kaiser', beta: 8 })
    const beta = screen.getByLabelText('Kaiser’s β')
    await user.clear(beta)
    await user.type(beta, '21')
    expect(within(stage('Spectrum')).getByRole('alert').textContent).toBe('At most 20')
    await user.clear(beta)
    await user.type(beta, '7.5')
    expect(recipes.at(-1)!.spectrumWindow).toEqual({ kind: 'kaiser', beta: 7.5 })
    await user.selectOptions(screen.getByLabelText('Window'), 'hann')
    expect(screen.queryByLabelText('Kaiser’s β')).toBeNull()
  })

  test('a window that needs more turns than the run has is not offered', () => {
    const outcome = exampleOutcome()
    outcome.result.run.turns = 3.4
    render(<Harness outcome={outcome} />)
    const offered = within(screen.getByLabelText('Window')).getAllByRole<HTMLOptionElement>('option')
    const closed = offered.filter(({ disabled }) => disabled).map(({ textContent }) => textContent)
    expect(closed).toEqual(['Blackman–Harris, from 4 turns', 'flat top, from 5 turns'])
  })

  test('what can’t be meant is told beside the field and changes nothing', async () => {
    const user = userEvent.setup()
    const onRecipe = vi.fn()
    render(<Harness onRecipe={onRecipe} />)
    const bins = screen.getByLabelText('Bins')
    await user.clear(bins)
    await user.type(bins, '5')
    expect(within(stage('Correction')).getByRole('alert').textContent).toBe('At least 8')
    expect(onRecipe).not.toHaveBeenCalled()
    await user.type(bins, '0')
    expect(onRecipe.mock.lastCall?.[0].table.binCount).toBe(50)
  })

  test('a unit brings its quantity with it, and an index mark its time', async () => {
    const user = userEvent.setup()
    const onRecipe = vi.fn()
    render(<Harness onRecipe={onRecipe} />)
    await user.selectOptions(screen.getByLabelText('Written as'), 'percent-sidereal')
    expect(onRecipe.mock.lastCall?.[0].table).toMatchObject({ quantity: 'rate', unit: 'percent-sidereal' })
    await user.selectOptions(within(stage('Correction')).getByLabelText('Zero at'), 'index-time')
    const mark = screen.getByLabelText('Mark at')
    await user.clear(mark)
    await user.type(mark, '12.5')
    expect(onRecipe.mock.lastCall?.[0].table.origin).toEqual({ kind: 'index-time', timeSeconds: 12.5 })
  })

  test('spans are left out by typing and taken back in', async () => {
    const user = userEvent.setup()
    const onRecipe = vi.fn()
    render(<Harness onRecipe={onRecipe} />)
    const track = within(stage('Track'))
    await user.click(track.getByText('Leave out a span'))
    await user.click(track.getByRole('button', { name: 'Leave out' }))
    expect(track.getByRole('alert').textContent).toContain('Give both ends')
    await user.type(track.getByLabelText('From'), '10')
    await user.type(track.getByLabelText('To'), '12.5')
    await user.click(track.getByRole('button', { name: 'Leave out' }))
    expect(onRecipe.mock.lastCall?.[0].excludedSpans).toEqual([{ startSeconds: 600, endSeconds: 750 }])
    await user.click(track.getByRole('button', { name: /^Use 10\.00 – 12\.50/ }))
    expect(onRecipe.mock.lastCall?.[0].excludedSpans).toEqual([])
  })

  test('are in the address, and come back from it', async () => {
    vi.useFakeTimers()
    window.history.replaceState(null, '', '/bench?sample=1&harmonics=2')
    const onRecipe = vi.fn()
    render(<Harness onRecipe={onRecipe} />)
    expect(onRecipe.mock.lastCall?.[0].harmonicCount).toBe(2)
    fireEvent.change(screen.getByLabelText('Drift'), { target: { value: '3' } })
    act(() => void vi.advanceTimersByTime(500))
    expect(window.location.search).toBe('?sample=1&drift=3&harmonics=2')
    fireEvent.click(screen.getByRole('button', { name: 'Undo' }))
    act(() => void vi.advanceTimersByTime(500))
    expect(window.location.search).toBe('?sample=1&harmonics=2')
  })

  test('are locked for those who only read', () => {
    render(<Harness isReadOnly notes={exampleNotes()} noteActions={{ onAdd: () => {} }} onMakeTable={() => {}} />)
    expect(
      screen.getByLabelText('How many').matches(':disabled') ||
        screen.getByLabelText('How many').closest('fieldset')?.disabled,
    ).toBe(true)
    expect(screen.queryByRole('button', { name: 'Undo' })).toBeNull()
    expect(screen.queryByRole('button', { name: 'Add a note' })).toBeNull()
    expect(screen.queryByRole('button', { name: 'Make a correction table' })).toBeNull()
  })
})

describe('making a table', () => {
  test('a proven sense and no correction in the mount give one of its own', async () => {
    const user = userEvent.setup()
    const onMakeTable = vi.fn()
    render(<Harness onMakeTable={onMakeTable} />)
    await user.click(screen.getByRole('button', { name: 'Make a correction table' }))
    expect(onMakeTable).toHaveBeenCalledWith({ kind: 'stand-alone', isAssumedSenseConfirmed: false })
  })

  test('an assumed sense must be confirmed first', async () => {
    const user = userEvent.setup()
    const onDownloadTable = vi.fn()
    const initial = exampleRecipe()
    initial.conversion.senseBasis = 'assumed'
    render(<Harness initial={initial} onDownloadTable={onDownloadTable} />)
    const download = screen.getByRole('button', { name: 'Download CSV' })
    await user.click(download)
    expect(onDownloadTable).not.toHaveBeenCalled()
    await user.click(screen.getByRole('checkbox', { name: /sign of this table is not proven/ }))
    await user.click(download)
    expect(onDownloadTable).toHaveBeenCalledWith('csv', { kind: 'stand-alone', isAssumedSenseConfirmed: true })
    expect(stage('Turn').textContent).toContain('furthest ahead (sense assumed)')
  })

  test.each(['on', 'unknown'] as const)('a correction that was %s gives only an addition', async (mountCorrection) => {
    const user = userEvent.setup()
    const onMakeTable = vi.fn()
    render(<Harness mountCorrection={mountCorrection} onMakeTable={onMakeTable} />)
    expect(screen.queryByRole('button', { name: 'Make a correction table' })).toBeNull()
    await user.click(screen.getByRole('button', { name: 'Make an addition' }))
    expect(onMakeTable.mock.lastCall?.[0].kind).toBe('addition')
  })

  test('a refusal is told beside the buttons', async () => {
    const user = userEvent.setup()
    render(<Harness onMakeTable={() => Promise.reject(new Error('Somebody else made it meanwhile.'))} />)
    await user.click(screen.getByRole('button', { name: 'Make a correction table' }))
    expect(await screen.findByText('Somebody else made it meanwhile.')).toBeTruthy()
  })
})

describe('notes', () => {
  test('stand in the stage they belong to, with the numbers of the pictures', () => {
    render(<Harness notes={exampleNotes()} />)
    expect(within(stage('Track')).getByText(/Cloud took/).textContent).toMatch(/^1/)
    expect(within(stage('Spectrum')).getByText(/Grub screw/).textContent).toMatch(/^2/)
    expect(within(stage('Turn')).getByText(/The knee/).textContent).toMatch(/^3/)
    expect(within(stage('Notes on the whole analysis')).getByText(/Steady air/)).toBeTruthy()
  })

  test('are pinned by typing a place', async () => {
    const user = userEvent.setup()
    const onAddNote = vi.fn()
    render(<Harness noteActions={{ onAdd: onAddNote }} />)
    const track = within(stage('Track'))
    await user.click(track.getByRole('button', { name: 'Add a note' }))
    await user.click(track.getByRole('button', { name: 'Add note' }))
    expect(track.getByRole('alert').textContent).toBe('Write something first')
    const place = track.getByLabelText('Time into the run')
    await user.clear(place)
    await user.type(place, '2.5')
    await user.type(track.getByLabelText('Note'), 'Wind')
    await user.click(track.getByRole('button', { name: 'Add note' }))
    expect(onAddNote).toHaveBeenCalledWith({
      anchor: { kind: 'time', timeSeconds: 150 },
      text: 'Wind',
      mentions: [],
    })
  })

  test('a note that could not be saved keeps its text and says why', async () => {
    const user = userEvent.setup()
    render(<Harness noteActions={{ onAdd: () => Promise.reject(new Error('The connection is gone.')) }} />)
    const whole = within(stage('Notes on the whole analysis'))
    await user.click(whole.getByRole('button', { name: 'Add a note' }))
    await user.type(whole.getByLabelText('Note'), 'Calm')
    await user.click(whole.getByRole('button', { name: 'Add note' }))
    expect((await whole.findByRole('alert')).textContent).toBe('The connection is gone.')
    expect(whole.getByLabelText<HTMLTextAreaElement>('Note').value).toBe('Calm')
  })
})

test('a long computation shows what it does after 200 ms, and can be cancelled', () => {
  vi.useFakeTimers()
  const onCancel = vi.fn()
  render(<Harness isComputing progress={{ stage: 'lines', fraction: 0.4 }} onCancel={onCancel} />)
  expect(screen.queryByRole('progressbar')).toBeNull()
  act(() => void vi.advanceTimersByTime(250))
  expect(
    screen.getByRole('progressbar', { name: 'Looking for lines beside the worm' }).getAttribute('aria-valuenow'),
  ).toBe('40')
  fireEvent.click(screen.getByRole('button', { name: 'Cancel' }))
  expect(onCancel).toHaveBeenCalledOnce()
})

describe('the display of a person', () => {
  function show(preferences: Partial<typeof DEFAULT_PREFERENCES>, initial = exampleRecipe()) {
    const onRecipe = vi.fn()
    render(
      <DisplayProvider preferences={{ ...DEFAULT_PREFERENCES, ...preferences }}>
        <Harness initial={initial} onRecipe={onRecipe} />
      </DisplayProvider>,
    )
    return { onRecipe }
  }
  const heads = (name: string, caption: string) =>
    within(within(stage(name)).getByRole('table', { name: caption }))
      .getAllByRole('columnheader')
      .map(({ textContent }) => textContent)

  test('peak-to-peak in pixels stands in every head and figure of a swing, and is said once', () => {
    show({ swingMeasure: 'peak-to-peak', displacementUnit: 'px' })
    expect(heads('Harmonics', 'Worm harmonics')).toEqual(['order', 'peak-to-peak px', 'phase °'])
    expect(heads('Spectrum', 'Lines beside the worm')[3]).toBe('peak-to-peak px')
    expect(heads('Turn', 'Each turn foretold by the other five')).toEqual(['turn', 'RMS px', 'left px', 'less'])
    expect(within(stage('Harmonics')).getByRole('cell', { name: '9.370 ± .054' })).toBeTruthy()
    expect(within(stage('Harmonics')).getByText(/^rim 9\.37\spx$/)).toBeTruthy()
    expect(
      screen.getByText(/Swings are shown from peak to peak.*in pixels of this run, 1\.57″ of the axis each/),
    ).toBeTruthy()
    expect(within(stage('Spans')).getByText('21.2 px')).toBeTruthy()
    // The correction keeps its own units.
    expect(stage('Correction').textContent).toContain('″')
    expect(stage('Correction').textContent).not.toMatch(/\dpx|\d\spx/)
  })

  test('without pixels of a known size it stays in arc seconds and says why', () => {
    const initial = exampleRecipe()
    show({ displacementUnit: 'px' }, { ...initial, conversion: { ...initial.conversion, displacementUnit: 'arcsec' } })
    expect(heads('Harmonics', 'Worm harmonics')).toEqual(['order', 'ampl. ″', 'phase °'])
    expect(screen.getByText(/this run has no pixels of a known size on the axis/)).toBeTruthy()
  })

  test('changes neither the recipe nor the address', () => {
    const { onRecipe } = show({ swingMeasure: 'peak-to-peak', displacementUnit: 'px' })
    expect(onRecipe).not.toHaveBeenCalled()
    expect(window.location.search).toBe('')
  })

  test('the usual display says nothing of itself', () => {
    show({})
    expect(screen.queryByText(/are shown (in|from)/)).toBeNull()
  })
})
