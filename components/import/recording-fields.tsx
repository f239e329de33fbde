import { wormPeriodText } from '@/components/projects/teeth'
import { MOUNT_CORRECTION_OPTIONS } from '@/components/runs/fact-options'
import { Field, FieldGroup } from '@/components/ui/field'
import { NumberField } from '@/components/ui/number-input'
import { Select } from '@/components/ui/select'
import { TextInput } from '@/components/ui/text-input'
import type { RunFacts } from '@/lib/schemas/run-facts'
import type { ImportDraft } from './import-draft'

interface RecordingFieldsProps {
  draft: ImportDraft
  onDraft: (draft: ImportDraft) => void
}

const stamps = [
  { value: 'mid', label: 'middle of the exposure' },
  { value: 'start', label: 'start of the exposure' },
  { value: 'end', label: 'end of the exposure' },
] as const

/** What was going on while the star was recorded. */
export function RecordingFields({ draft, onDraft }: RecordingFieldsProps) {
  const { conversion, facts, wheelTeeth } = draft
  const changeFacts = (part: Partial<RunFacts>) => onDraft({ ...draft, facts: { ...facts, ...part } })
  return (
    <FieldGroup legend="Mount and recording">
      <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
        <NumberField
          label="Teeth of the worm wheel"
          hint={
            wheelTeeth === null
              ? 'Empty if unknown: three turns or more show the period.'
              : `One turn of the worm takes ${wormPeriodText(wheelTeeth)}.`
          }
          value={wheelTeeth}
          onValue={(teeth) => onDraft({ ...draft, wheelTeeth: teeth })}
          isInteger
          min={1}
          max={100_000}
        />
        <Field label="Correction in the mount" hint="Only a recording with it off gives a table of its own.">
          {(control) => (
            <Select
              {...control}
              options={MOUNT_CORRECTION_OPTIONS}
              value={facts.mountCorrection}
              onChange={(event) => {
                const chosen = MOUNT_CORRECTION_OPTIONS.find(({ value }) => value === event.target.value)
                if (chosen) changeFacts({ mountCorrection: chosen.value })
              }}
            />
          )}
        </Field>
      </div>
      {facts.mountCorrection === 'on' ? (
        <Field label="Which table was playing">
          {(control) => (
            <TextInput
              {...control}
              value={facts.mountCorrectionTable ?? ''}
              maxLength={200}
              onChange={(event) => changeFacts({ mountCorrectionTable: event.target.value || null })}
            />
          )}
        </Field>
      ) : null}
      <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
        <NumberField
          label="Exposure"
          unit="s"
          hint="Empty if unknown."
          value={conversion.exposureSeconds}
          onValue={(exposureSeconds) => onDraft({ ...draft, conversion: { ...conversion, exposureSeconds } })}
          min={0}
          max={3600}
        />
        <Field label="The time stamp marks the">
          {(control) => (
            <Select
              {...control}
              options={stamps}
              value={conversion.timeStamp}
              onChange={(event) => {
                const chosen = stamps.find(({ value }) => value === event.target.value)
                if (chosen) onDraft({ ...draft, conversion: { ...conversion, timeStamp: chosen.value } })
              }}
            />
          )}
        </Field>
      </div>
    </FieldGroup>
  )
}
