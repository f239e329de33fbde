import { GUIDING_OPTIONS, SIDE_OF_PIER_OPTIONS, TRACKING_RATE_OPTIONS } from '@/components/runs/fact-options'
import { StartTimeField } from '@/components/runs/start-time-field'
import { Field } from '@/components/ui/field'
import { NumberField } from '@/components/ui/number-input'
import { Select } from '@/components/ui/select'
import { TextInput } from '@/components/ui/text-input'
import { runFactsSchema, type RunFacts } from '@/lib/schemas/run-facts'

interface NightFieldsProps {
  facts: RunFacts
  onFacts: (facts: RunFacts) => void
}

/** Facts that help to compare runs later; none is needed to read the file. */
export function NightFields({ facts, onFacts }: NightFieldsProps) {
  const change = (part: Partial<RunFacts>) => onFacts({ ...facts, ...part })
  return (
    <details className="rounded-control border border-rule px-4 py-2.5">
      <summary className="font-medium">More about the night, for comparing runs later</summary>
      <div className="mt-3 mb-1 grid grid-cols-2 gap-3 max-sm:grid-cols-1">
        <StartTimeField
          value={facts.startedAt}
          onValue={(startedAt) => change({ startedAt })}
          emptyHint="Left empty, the file’s own time counts, if it has one."
        />
        <Field label="Guiding">
          {(control) => (
            <Select
              {...control}
              options={GUIDING_OPTIONS}
              value={facts.guiding}
              onChange={(event) => change({ guiding: runFactsSchema.shape.guiding.parse(event.target.value) })}
            />
          )}
        </Field>
        <Field label="Tracking rate">
          {(control) => (
            <Select
              {...control}
              options={TRACKING_RATE_OPTIONS}
              value={facts.trackingRate}
              onChange={(event) =>
                change({ trackingRate: runFactsSchema.shape.trackingRate.parse(event.target.value) })
              }
            />
          )}
        </Field>
        <Field label="Side of the pier">
          {(control) => (
            <Select
              {...control}
              options={SIDE_OF_PIER_OPTIONS}
              value={facts.sideOfPier}
              onChange={(event) => change({ sideOfPier: runFactsSchema.shape.sideOfPier.parse(event.target.value) })}
            />
          )}
        </Field>
        <NumberField
          label="Hour angle"
          unit="°"
          hint="West of the meridian is positive."
          value={facts.hourAngleDegrees}
          onValue={(hourAngleDegrees) => change({ hourAngleDegrees })}
          min={-180}
          max={180}
        />
        <NumberField
          label="Temperature"
          unit="°C"
          value={facts.temperatureCelsius}
          onValue={(temperatureCelsius) => change({ temperatureCelsius })}
          min={-80}
          max={80}
        />
        <Field label="Load and balance">
          {(control) => (
            <TextInput
              {...control}
              value={facts.loadAndBalance ?? ''}
              maxLength={500}
              onChange={(event) => change({ loadAndBalance: event.target.value || null })}
            />
          )}
        </Field>
      </div>
    </details>
  )
}
