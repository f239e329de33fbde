'use client'

import { useRouter } from 'next/navigation'
import { useState, type ReactNode } from 'react'
import { SaveTroubles } from '@/components/projects/save-troubles'
import { useSave } from '@/components/projects/use-save'
import {
  GUIDING_OPTIONS,
  MOUNT_CORRECTION_OPTIONS,
  SIDE_OF_PIER_OPTIONS,
  TRACKING_RATE_OPTIONS,
} from '@/components/runs/fact-options'
import { StartTimeField } from '@/components/runs/start-time-field'
import { Button, ButtonAnchor } from '@/components/ui/button'
import { TitledCard } from '@/components/ui/card'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { focusFirstInvalid } from '@/components/ui/focus-first-invalid'
import { NumberField } from '@/components/ui/number-input'
import { Select, type SelectOption } from '@/components/ui/select'
import { TextInput } from '@/components/ui/text-input'
import { useDates } from '@/lib/client/display'
import { sendJson } from '@/lib/client/fetcher'
import { runSchema, type Run } from '@/lib/schemas/api'
import type { RunFacts } from '@/lib/schemas/run-facts'
import { formatBytes, formatCount, formatNumber } from '@/lib/units'

type Choice = 'sideOfPier' | 'trackingRate' | 'mountCorrection' | 'guiding'

const CHOICES: Record<Choice, { label: string; options: readonly SelectOption[] }> = {
  sideOfPier: { label: 'Side of the pier', options: SIDE_OF_PIER_OPTIONS },
  trackingRate: { label: 'Tracking rate', options: TRACKING_RATE_OPTIONS },
  mountCorrection: { label: 'Correction in the mount', options: MOUNT_CORRECTION_OPTIONS },
  guiding: { label: 'Guiding', options: GUIDING_OPTIONS },
}

/** What is known of a stored run beside its numbers, and its original file; or why nobody may change that here now. */
export function RunFactsPanel({ run, whyReadOnly }: { run: Run; whyReadOnly: string | null }) {
  const [isEditing, setEditing] = useState(false)
  const { facts } = run
  const { dayAndTimeWithZone } = useDates()
  return (
    <>
      <TitledCard
        title="About this run"
        actions={
          <div className="no-print flex flex-wrap gap-2">
            {whyReadOnly === null ? <Button onClick={() => setEditing(true)}>Change what is known</Button> : null}
            <ButtonAnchor href={`/api/projects/${run.projectId}/runs/${run.id}/file`}>
              Download the original
            </ButtonAnchor>
          </div>
        }
      >
        <dl className="grid grid-cols-3 gap-x-8 gap-y-2 max-lg:grid-cols-2 max-sm:grid-cols-1">
          <Fact term="Recorded">{facts.startedAt ? dayAndTimeWithZone(facts.startedAt) : 'not known'}</Fact>
          <Fact term="Hour angle">
            {facts.hourAngleDegrees === null ? 'not known' : degrees(facts.hourAngleDegrees, '°')}
          </Fact>
          {(Object.keys(CHOICES) as Choice[]).map((key) => (
            <Fact key={key} term={CHOICES[key].label}>
              {CHOICES[key].options.find(({ value }) => value === facts[key])?.label}
            </Fact>
          ))}
          {facts.mountCorrection === 'on' ? (
            <Fact term="Table in the mount">{facts.mountCorrectionTable ?? 'not named'}</Fact>
          ) : null}
          <Fact term="Temperature">
            {facts.temperatureCelsius === null ? 'not known' : degrees(facts.temperatureCelsius, '°C')}
          </Fact>
          <Fact term="Load and balance">{facts.loadAndBalance ?? 'not noted'}</Fact>
          <Fact term="Sense">{facts.senseProof ?? 'assumed, not proven'}</Fact>
          <Fact term="File">
            <span className="break-all">{run.fileName}</span>, {formatBytes(run.byteLength)}
            {run.rowCount === null ? '' : `, ${formatCount(run.rowCount)} rows`}
          </Fact>
          <Fact term="SHA-256 of the file">
            <span className="figures text-sm break-all">{run.fileSha256}</span>
          </Fact>
        </dl>
        {whyReadOnly === null ? null : <p className="no-print mt-3 text-sm text-soft">{whyReadOnly}</p>}
      </TitledCard>
      <Dialog isOpen={isEditing} onClose={() => setEditing(false)} title="What is known of this run">
        <FactsForm run={run} onClose={() => setEditing(false)} />
      </Dialog>
    </>
  )
}

/** As it was typed, with a decimal only where there is one. */
function degrees(value: number, unit: string): string {
  return formatNumber(value, Number.isInteger(value) ? 0 : 1, { unit })
}

function Fact({ term, children }: { term: string; children: ReactNode }) {
  return (
    <div className="border-b border-rule pb-1.5">
      <dt className="text-sm text-soft">{term}</dt>
      <dd>{children}</dd>
    </div>
  )
}

/** Where theirs is not what stands in the form. */
function theirFacts(theirs: Run, mine: { name: string; facts: RunFacts }): string {
  const { facts } = theirs
  const differs = (key: keyof RunFacts) => facts[key] !== mine.facts[key]
  const shown = (value: number | null, unit: string) => (value === null ? 'not known' : degrees(value, unit))
  const parts = [
    theirs.name === mine.name ? null : `name “${theirs.name}”`,
    ...(Object.keys(CHOICES) as Choice[]).map((key) =>
      differs(key)
        ? `${CHOICES[key].label} ${CHOICES[key].options.find(({ value }) => value === facts[key])?.label}`
        : null,
    ),
    differs('startedAt') ? 'another start' : null,
    differs('hourAngleDegrees') ? `hour angle ${shown(facts.hourAngleDegrees, '°')}` : null,
    differs('temperatureCelsius') ? `temperature ${shown(facts.temperatureCelsius, '°C')}` : null,
    differs('mountCorrectionTable') ? `table in the mount ${facts.mountCorrectionTable ?? 'not named'}` : null,
    differs('loadAndBalance') ? `load and balance ${facts.loadAndBalance ?? 'not noted'}` : null,
  ].filter((part) => part !== null)
  return parts.length === 0 ? 'the same as yours' : parts.join('; ')
}

function FactsForm({ run, onClose }: { run: Run; onClose: () => void }) {
  const router = useRouter()
  const [name, setName] = useState(run.name)
  // What the form was filled from: the page may learn of a newer one while it is open.
  const [from, setFrom] = useState(run)
  const [facts, setFacts] = useState<RunFacts>(run.facts)
  const { save, isBusy, fault, conflict, dropConflict } = useSave(runSchema)
  const change = (part: Partial<RunFacts>) => setFacts((now) => ({ ...now, ...part }))

  async function send({ version, conversion }: Run) {
    const body = { version, name, conversion, facts }
    const saved = await save(() => sendJson('PATCH', `/api/projects/${run.projectId}/runs/${run.id}`, body, runSchema))
    if (!saved) return
    onClose()
    router.refresh()
  }

  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault()
        if (!focusFirstInvalid(event.currentTarget)) void send(from)
      }}
    >
      <Field label="Name of the run" error={name.trim() === '' ? 'Give it a name' : null}>
        {(control) => (
          <TextInput
            {...control}
            required
            maxLength={120}
            value={name}
            onChange={(event) => setName(event.target.value)}
          />
        )}
      </Field>
      <StartTimeField value={facts.startedAt} onValue={(startedAt) => change({ startedAt })} />
      <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
        {(Object.keys(CHOICES) as Choice[]).map((key) => (
          <Field key={key} label={CHOICES[key].label}>
            {(control) => (
              <Select
                {...control}
                options={CHOICES[key].options}
                value={facts[key]}
                onChange={(event) => change({ [key]: event.target.value } as Partial<RunFacts>)}
              />
            )}
          </Field>
        ))}
        <NumberField
          label="Hour angle"
          hint="West positive."
          unit="°"
          min={-180}
          max={180}
          value={facts.hourAngleDegrees}
          onValue={(hourAngleDegrees) => change({ hourAngleDegrees })}
        />
        <NumberField
          label="Temperature"
          unit="°C"
          min={-80}
          max={80}
          value={facts.temperatureCelsius}
          onValue={(temperatureCelsius) => change({ temperatureCelsius })}
        />
      </div>
      <OptionalText
        label="Table in the mount"
        maxLength={200}
        value={facts.mountCorrectionTable}
        onValue={(mountCorrectionTable) => change({ mountCorrectionTable })}
      />
      <OptionalText
        label="Load and balance"
        maxLength={500}
        value={facts.loadAndBalance}
        onValue={(loadAndBalance) => change({ loadAndBalance })}
      />
      <SaveTroubles
        thing="this run"
        fault={fault}
        conflict={conflict}
        theirs={(theirs) => theirFacts(theirs, { name, facts })}
        onKeepMine={(theirs) => void send(theirs)}
        onTakeTheirs={(theirs) => {
          setFrom(theirs)
          setName(theirs.name)
          setFacts(theirs.facts)
          dropConflict()
          router.refresh()
        }}
      />
      <Actions className="mt-0">
        <Button onClick={onClose}>Not now</Button>
        <Button type="submit" variant="primary" disabled={isBusy}>
          Save
        </Button>
      </Actions>
    </form>
  )
}

interface OptionalTextProps {
  label: string
  maxLength: number
  value: string | null
  onValue: (value: string | null) => void
}

function OptionalText({ label, maxLength, value, onValue }: OptionalTextProps) {
  return (
    <Field label={label}>
      {(control) => (
        <TextInput
          {...control}
          maxLength={maxLength}
          value={value ?? ''}
          onChange={(event) => onValue(event.target.value || null)}
        />
      )}
    </Field>
  )
}
