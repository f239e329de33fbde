'use client'

import { useRouter } from 'next/navigation'
import { useCallback, useEffect, useMemo, useRef, useState } from 'react'
import { Bench } from '@/components/bench/bench'
import type { IntakeFile } from '@/components/import/file-intake'
import type { ImportChoices } from '@/components/import/import-draft'
import { Button, ButtonLink } from '@/components/ui/button'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Notice } from '@/components/ui/notice'
import type { Recipe } from '@/lib/analysis/types'
import {
  dropKeptWork,
  findKeptWork,
  isOfAnotherTab,
  keepWork,
  newWorkId,
  tieTabTo,
  type KeptWork,
} from '@/lib/client/kept-work'
import { RequestError } from '@/lib/client/fetcher'
import { createWorkSaver } from '@/lib/client/save-work'
import { useBenchAnalysis } from '@/lib/client/use-analysis'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { withRecipeAddress } from '@/lib/schemas/recipe-address'
import { assertCurrent } from './assert-current'
import { downloadTable } from './download-table'
import { loadSample } from './load-sample'
import { ReadingScreen } from './reading-screen'
import { SaveDialog, type SaveChoice } from './save-dialog'
import { useFileReading } from './use-file-reading'
import { WorkerFault } from './worker-fault'

/** Asks for the save dialog once the work is back after signing in. */
const SAVE_PARAMETER = 'save'
/** Opens the sample run at once. */
const SAMPLE_PARAMETER = 'sample'

const KEPT_ON_RELOAD = 'your file and settings are kept'

/** The bench for everyone: a file of one's own or the sample, wholly in this browser until it is saved. */
export function OpenBench({ isSignedIn }: { isSignedIn: boolean }) {
  const router = useRouter()
  const [work, setWork] = useState<KeptWork | null>(null)
  const [recipe, setRecipe] = useState<Recipe | null>(null)
  const [isRestoring, setRestoring] = useState(true)
  const [isKept, setKept] = useState(true)
  /** What another tab has kept in the place of what this one showed. */
  const [replacing, setReplacing] = useState<KeptWork | null>(null)
  const [fault, setFault] = useState<string | null>(null)
  const [dialog, setDialog] = useState<'none' | 'account' | 'save'>('none')
  const analysis = useBenchAnalysis(recipe)
  const { loadFile } = analysis

  const open = useCallback((opened: KeptWork) => {
    tieTabTo(opened.id ?? null)
    setReplacing(null)
    setWork(opened)
    setRecipe(recipeOf(opened))
    setRestoring(false)
  }, [])

  const onRead = useCallback(
    async (file: IntakeFile, { settings, conversion, facts, wheelTeeth }: ImportChoices) => {
      const driveTrain = { ...defaultRecipe().driveTrain, wheelTeeth }
      const opened: KeptWork = { version: 1, id: newWorkId(), ...file, settings, conversion, facts, driveTrain }
      forgetSettings()
      setKept(await keepWork(opened))
      open(opened)
    },
    [open],
  )
  const file = useFileReading({ analysis, onRead })

  const openSample = useCallback(async () => {
    setFault(null)
    try {
      const sample = await loadSample()
      const loaded = await loadFile(sample.bytes, sample.settings)
      if (!loaded.ok) throw new Error(loaded.fault.message)
      setKept(await keepWork(sample))
      open(sample)
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'The sample run could not be read. Reload the page.')
      setRestoring(false)
    }
  }, [loadFile, open])

  // What was on the bench before a reload or the way through sign-in is put back, once.
  const isStarted = useRef(false)
  useEffect(() => {
    if (isStarted.current) return
    isStarted.current = true
    const restore = async () => {
      const parameters = new URLSearchParams(window.location.search)
      const kept = await findKeptWork()
      if (parameters.has(SAMPLE_PARAMETER) && !parameters.has(SAVE_PARAMETER)) return openSample()
      if (!kept) return setRestoring(false)
      if (isOfAnotherTab(kept)) {
        setReplacing(kept)
        return setRestoring(false)
      }
      const loaded = await loadFile(kept.bytes, kept.settings)
      if (!loaded.ok) return setRestoring(false)
      open(kept)
      if (parameters.has(SAVE_PARAMETER) && isSignedIn) setDialog('save')
      removeParameter(SAVE_PARAMETER)
    }
    void restore()
  }, [isSignedIn, loadFile, open, openSample])

  const startOver = useCallback(async () => {
    if (work) await dropKeptWork(work)
    tieTabTo(null)
    forgetSettings()
    file.startOver()
    setWork(null)
    setRecipe(null)
  }, [file, work])

  /** Keeps the work once more: another tab may have put its own in the place. */
  function askForAccount() {
    setDialog('account')
    if (work) void keepWork(work).then(setKept)
  }

  /** Shows what the other tab keeps, with its own settings: those in this address were made for another recording. */
  async function openReplacing(kept: KeptWork) {
    forgetSettings()
    const loaded = await loadFile(kept.bytes, kept.settings)
    if (loaded.ok) open(kept)
    else setFault(loaded.fault.message)
  }

  const saver = useMemo(() => (work ? createWorkSaver() : null), [work])
  const [step, setStep] = useState<string | null>(null)
  const result = analysis.outcome?.ok ? analysis.outcome.result : null

  async function save(choice: SaveChoice) {
    if (!work || !recipe || !result || !saver) return
    assertCurrent(analysis)
    try {
      const saved = await saver({ work, recipe, result, ...choice }, setStep)
      await dropKeptWork(work)
      router.push(`/projects/${saved.projectId}/analyses/${saved.id}`)
    } catch (error) {
      if (error instanceof RequestError && error.isSignedOut) askForAccount()
      throw error
    } finally {
      setStep(null)
    }
  }

  if (!work || !recipe) {
    return (
      <ReadingScreen
        title="What does your mount do in one turn of its worm?"
        lead="Bring a recording of a star with guiding off, or take the sample run. It stays in this browser until you sign in and save it."
        file={isRestoring ? { ...file, isBusy: true } : file}
        onSample={() => void openSample()}
        submitLabel="Show the worm"
      >
        {replacing ? (
          <Notice
            tone="warning"
            isLive
            title="Another tab has replaced the recording that was open here"
            actions={
              <Button onClick={() => void openReplacing(replacing)}>Open {replacing.fileName} of the other tab</Button>
            }
          >
            This browser keeps one recording at a time. Bring the file again; the settings that you had for it are still
            in the address.
          </Notice>
        ) : null}
        {fault ? <Notice tone="error">{fault}</Notice> : null}
        <WorkerFault message={analysis.fault} kept={KEPT_ON_RELOAD} />
      </ReadingScreen>
    )
  }

  const runName = nameOf(work)
  return (
    <>
      <Bench
        key={`${work.fileName} ${work.bytes.length}`}
        outcome={analysis.outcome}
        recipe={recipe}
        baseRecipe={recipeOf(work)}
        onRecipeChange={setRecipe}
        progress={analysis.progress}
        isComputing={analysis.isComputing}
        onCancel={analysis.cancel}
        runLabel={runName}
        crumbs={`Open bench / ${runName}`}
        actions={
          <>
            <Button onClick={() => void startOver()}>Another file</Button>
            <Button
              variant="primary"
              disabled={!result}
              onClick={() => (isSignedIn ? setDialog('save') : askForAccount())}
            >
              Save analysis
            </Button>
          </>
        }
        notes={[]}
        onDownloadTable={(format, request) => {
          assertCurrent(analysis)
          if (result) downloadTable({ format, request, result, recipe, runName })
        }}
        hasWormAngle={analysis.loaded?.ok === true && analysis.loaded.hasWormAngle}
        mountCorrection={work.facts.mountCorrection}
        isReadOnly={false}
      />
      <WorkerFault message={analysis.fault} kept={KEPT_ON_RELOAD} />
      <AccountDialog isOpen={dialog === 'account'} onClose={() => setDialog('none')} isKept={isKept} />
      <SaveDialog
        isOpen={dialog === 'save'}
        onClose={() => setDialog('none')}
        defaults={{ projectName: 'My mount', runName, analysisName: 'First look' }}
        onSave={save}
        onSignedOut={askForAccount}
        progressText={step}
      />
    </>
  )
}

/** Saving needs an account; what is on the bench waits here meanwhile. */
function AccountDialog({ isOpen, onClose, isKept }: { isOpen: boolean; onClose: () => void; isKept: boolean }) {
  const next = isOpen ? `?next=${encodeURIComponent(addressWithSave())}` : ''
  return (
    <Dialog isOpen={isOpen} onClose={onClose} title="Saving needs an account">
      <p>
        {isKept
          ? 'The recording and your settings wait in this browser while you sign up or sign in; then you choose where to save them.'
          : 'This browser keeps nothing for us (a private window, perhaps): after signing in, bring the file again. Your settings stay in the address.'}
      </p>
      <Actions>
        <Button onClick={onClose}>Not now</Button>
        <ButtonLink href={`/sign-in${next}`}>Sign in</ButtonLink>
        <ButtonLink variant="primary" href={`/sign-up${next}`}>
          Sign up
        </ButtonLink>
      </Actions>
    </Dialog>
  )
}

function recipeOf({ conversion, driveTrain }: KeptWork): Recipe {
  return { ...defaultRecipe(), conversion, driveTrain }
}

function nameOf({ fileName }: KeptWork): string {
  return fileName.replace(/\.[a-z0-9]{1,5}$/i, '').slice(0, 120) || 'Recording'
}

/** The address as it is, asking for the save dialog on return. */
function addressWithSave(): string {
  const parameters = new URLSearchParams(window.location.search)
  parameters.delete(SAMPLE_PARAMETER)
  parameters.set(SAVE_PARAMETER, '1')
  return `${window.location.pathname}?${parameters}`
}

function removeParameter(name: string): void {
  const url = new URL(window.location.href)
  if (!url.searchParams.has(name)) return
  url.searchParams.delete(name)
  window.history.replaceState(window.history.state, '', url)
}

/** A new file starts from its own settings, not from those of the last one in the address. */
function forgetSettings(): void {
  const base = defaultRecipe()
  const search = withRecipeAddress(window.location.search, base, base)
  window.history.replaceState(window.history.state, '', window.location.pathname + search)
  removeParameter(SAMPLE_PARAMETER)
}
