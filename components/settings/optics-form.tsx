'use client'

import { useState } from 'react'
import { SaveTroubles } from '@/components/projects/save-troubles'
import { useSave } from '@/components/projects/use-save'
import { Button } from '@/components/ui/button'
import { Actions } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { focusFirstInvalid } from '@/components/ui/focus-first-invalid'
import { NumberField } from '@/components/ui/number-input'
import { TextInput } from '@/components/ui/text-input'
import { sendJson } from '@/lib/client/fetcher'
import type { OpticsPreset } from '@/lib/client/project-data'
import { opticsFieldsSchema, opticsPresetSchema } from '@/lib/schemas/api'
import { formatNumber, imageScaleArcsecPerPx } from '@/lib/units'

interface OpticsFormProps {
  url: string
  /** Null for new optics. */
  preset: OpticsPreset | null
  onSaved: () => void
  onClose: () => void
}

type Typed = Omit<OpticsPreset, 'id' | 'version' | 'imageScaleArcsecPerPx'> & { imageScaleArcsecPerPx: number | null }

const blank: Typed = {
  name: '',
  focalLengthMm: null,
  pixelSizeUm: null,
  binning: 1,
  imageScaleArcsecPerPx: null,
  imageScaleUncertaintyPercent: 1,
}

export function OpticsForm({ url, preset, onSaved, onClose }: OpticsFormProps) {
  const [typed, setTyped] = useState<Typed>(preset ?? blank)
  const [faults, setFaults] = useState<Record<string, string>>({})
  const { save, isBusy, fault, fields, conflict, dropConflict } = useSave(opticsPresetSchema)
  const change = (part: Partial<Typed>) => setTyped((before) => ({ ...before, ...part }))

  /** Focal length, pixel size and binning decide the scale; a measured scale is typed over it. */
  function changeOptics(part: Partial<Typed>) {
    const next = { ...typed, ...part }
    const scale = imageScaleArcsecPerPx({
      focalLengthMillimetres: next.focalLengthMm,
      pixelSizeMicrometres: next.pixelSizeUm,
      binning: next.binning,
    })
    setTyped(scale === null ? next : { ...next, imageScaleArcsecPerPx: Number(scale.toPrecision(7)) })
  }

  async function send(version: number | null) {
    const parsed = opticsFieldsSchema.safeParse(typed)
    if (!parsed.success) {
      setFaults(Object.fromEntries(parsed.error.issues.map(({ path, message }) => [path.join('.'), message])))
      return
    }
    setFaults({})
    const saved = await save(() =>
      preset && version !== null
        ? sendJson('PATCH', `${url}/${preset.id}`, { ...parsed.data, version }, opticsPresetSchema)
        : sendJson('POST', url, parsed.data, opticsPresetSchema),
    )
    if (saved) onSaved()
  }

  const errorOf = (name: keyof Typed) => faults[name] ?? fields[name]
  return (
    <form
      noValidate
      className="flex flex-col gap-3"
      onSubmit={(event) => {
        event.preventDefault()
        if (!focusFirstInvalid(event.currentTarget)) void send(preset?.version ?? null)
      }}
    >
      <Field label="Name" error={errorOf('name')}>
        {(control) => (
          <TextInput
            {...control}
            value={typed.name}
            autoComplete="off"
            onChange={(event) => change({ name: event.target.value })}
          />
        )}
      </Field>
      <div className="grid grid-cols-3 gap-3 max-sm:grid-cols-1">
        <NumberField
          label="Focal length"
          unit="mm"
          value={typed.focalLengthMm}
          onValue={(focalLengthMm) => changeOptics({ focalLengthMm })}
          error={errorOf('focalLengthMm')}
          min={1}
          max={100_000}
        />
        <NumberField
          label="Pixel size"
          unit="µm"
          value={typed.pixelSizeUm}
          onValue={(pixelSizeUm) => changeOptics({ pixelSizeUm })}
          error={errorOf('pixelSizeUm')}
          min={0.1}
          max={1000}
        />
        <NumberField
          label="Binning"
          value={typed.binning}
          onValue={(binning) => changeOptics({ binning })}
          error={errorOf('binning')}
          isInteger
          min={1}
          max={16}
        />
      </div>
      <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
        <NumberField
          label="Image scale"
          unit="″/px"
          hint="Worked out from the three above, or measured."
          value={typed.imageScaleArcsecPerPx}
          onValue={(imageScale) => change({ imageScaleArcsecPerPx: imageScale })}
          error={errorOf('imageScaleArcsecPerPx') && 'Type the scale, or focal length, pixel size and binning'}
          max={1000}
        />
        <NumberField
          label="Its uncertainty"
          unit="%"
          hint="1 % for a focal length from the label, 0.2 % for a measured scale."
          value={typed.imageScaleUncertaintyPercent}
          onValue={(percent) => percent !== null && change({ imageScaleUncertaintyPercent: percent })}
          error={errorOf('imageScaleUncertaintyPercent')}
          isRequired
          min={0}
          max={100}
        />
      </div>
      <SaveTroubles
        thing="these optics"
        fault={fault}
        conflict={conflict}
        theirs={({ name, imageScaleArcsecPerPx: scale, imageScaleUncertaintyPercent: uncertainty }) =>
          `“${name}”, ${formatNumber(scale, 3, { unit: '″/px' })} ± ${formatNumber(uncertainty, 1, { unit: '%' })}`
        }
        onKeepMine={({ version: newest }) => void send(newest)}
        onTakeTheirs={() => {
          dropConflict()
          onSaved()
        }}
      />
      <Actions className="mt-2">
        <Button onClick={onClose}>Cancel</Button>
        <Button type="submit" variant="primary" disabled={isBusy}>
          Save
        </Button>
      </Actions>
    </form>
  )
}
