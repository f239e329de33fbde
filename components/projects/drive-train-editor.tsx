'use client'

import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { NumberField } from '@/components/ui/number-input'
import { Select } from '@/components/ui/select'
import { TextInput } from '@/components/ui/text-input'
import type { DriveTrain, GearStage } from '@/lib/analysis/types'

const maxStages = 12
const kinds = [
  { value: 'belt', label: 'Toothed belt' },
  { value: 'gear-pair', label: 'Pair of gears' },
] as const

interface DriveTrainEditorProps {
  value: DriveTrain
  onValue: (value: DriveTrain) => void
  isReadOnly?: boolean
}

/** The wheel, the worm and what drives it, listed from the worm towards the motor. */
export function DriveTrainEditor({ value, onValue, isReadOnly = false }: DriveTrainEditorProps) {
  const change = (part: Partial<DriveTrain>) => onValue({ ...value, ...part })
  const changeStage = (index: number, stage: GearStage) =>
    change({ stages: value.stages.map((other, i) => (i === index ? stage : other)) })

  return (
    <fieldset disabled={isReadOnly} className="flex max-w-3xl flex-col gap-5">
      <legend className="sr-only">Drive train</legend>
      <div className="grid grid-cols-1 gap-4 sm:grid-cols-2">
        <NumberField
          label="Teeth of the worm wheel"
          hint="Empty if unknown."
          value={value.wheelTeeth}
          onValue={(wheelTeeth) => change({ wheelTeeth })}
          isInteger
          min={1}
          max={100_000}
        />
        <NumberField
          label="Starts of the worm"
          hint="1 unless the maker says otherwise."
          value={value.wormStarts}
          onValue={(wormStarts) => wormStarts !== null && change({ wormStarts })}
          isInteger
          isRequired
          min={1}
          max={16}
        />
      </div>

      {value.stages.map((stage, index) => (
        <StageFields
          key={index}
          number={index + 1}
          stage={stage}
          onStage={(changed) => changeStage(index, changed)}
          onRemove={() => change({ stages: value.stages.filter((_, i) => i !== index) })}
          isReadOnly={isReadOnly}
        />
      ))}

      {isReadOnly || value.stages.length >= maxStages ? null : (
        <div className="flex flex-wrap gap-2">
          <Button onClick={() => change({ stages: [...value.stages, newStage('belt')] })}>Add a belt</Button>
          <Button onClick={() => change({ stages: [...value.stages, newStage('gear-pair')] })}>
            Add a pair of gears
          </Button>
        </div>
      )}
    </fieldset>
  )
}

interface StageFieldsProps {
  number: number
  stage: GearStage
  onStage: (stage: GearStage) => void
  onRemove: () => void
  isReadOnly: boolean
}

function StageFields({ number, stage, onStage, onRemove, isReadOnly }: StageFieldsProps) {
  const wheel = stage.kind === 'belt' ? 'pulley' : 'gear'
  return (
    <fieldset className="rounded-control border border-rule p-4">
      <legend className="px-1.5 font-semibold">Stage {number} from the worm</legend>
      <div className="grid grid-cols-2 gap-4 max-sm:grid-cols-1">
        <Field label="Kind">
          {(control) => (
            <Select
              {...control}
              options={kinds}
              value={stage.kind}
              onChange={(event) => onStage(asKind(stage, event.target.value === 'belt' ? 'belt' : 'gear-pair'))}
            />
          )}
        </Field>
        <Field label="Name">
          {(control) => (
            <TextInput
              {...control}
              value={stage.name}
              maxLength={80}
              onChange={(event) => onStage({ ...stage, name: event.target.value })}
            />
          )}
        </Field>
        <Teeth
          label={`Teeth, ${wheel} on the worm’s side`}
          value={stage.drivenTeeth}
          onValue={(drivenTeeth) => onStage({ ...stage, drivenTeeth })}
        />
        <Teeth
          label={`Teeth, ${wheel} on the motor’s side`}
          value={stage.drivingTeeth}
          onValue={(drivingTeeth) => onStage({ ...stage, drivingTeeth })}
        />
        {stage.kind === 'belt' ? (
          <Teeth
            label="Teeth of the belt"
            value={stage.beltTeeth}
            onValue={(beltTeeth) => onStage({ ...stage, beltTeeth })}
          />
        ) : null}
      </div>
      {isReadOnly ? null : (
        <div className="mt-3">
          <Button onClick={onRemove} aria-label={`Remove stage ${number}, ${stage.name}`}>
            Remove
          </Button>
        </div>
      )}
    </fieldset>
  )
}

function Teeth({ label, value, onValue }: { label: string; value: number; onValue: (value: number) => void }) {
  return (
    <NumberField
      label={label}
      value={value}
      onValue={(teeth) => teeth !== null && onValue(teeth)}
      isInteger
      isRequired
      min={1}
      max={100_000}
    />
  )
}

function newStage(kind: GearStage['kind']): GearStage {
  return kind === 'belt'
    ? { kind, name: 'Belt', drivenTeeth: 60, drivingTeeth: 20, beltTeeth: 100 }
    : { kind, name: 'Gears', drivenTeeth: 48, drivingTeeth: 12 }
}

/** The same stage as the other kind; what both have in common stays. */
function asKind(stage: GearStage, kind: GearStage['kind']): GearStage {
  const { name, drivenTeeth, drivingTeeth } = stage
  if (kind === 'gear-pair') return { kind, name, drivenTeeth, drivingTeeth }
  return { kind, name, drivenTeeth, drivingTeeth, beltTeeth: stage.kind === 'belt' ? stage.beltTeeth : 100 }
}
