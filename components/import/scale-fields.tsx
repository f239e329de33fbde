import { Field, FieldGroup } from '@/components/ui/field'
import { NumberField } from '@/components/ui/number-input'
import { Segmented } from '@/components/ui/segmented'
import { Select } from '@/components/ui/select'
import { formatSignificant } from '@/lib/units'
import { setScale, type ImportDraft } from './import-draft'
import type { ImportFieldFaults } from './import-faults'

/** Optics that were stored before, offered for the image scale. */
export interface KnownOptics {
  id: string
  name: string
  imageScaleArcsecPerPx: number
  imageScaleUncertaintyPercent: number
}

interface ScaleFieldsProps {
  draft: ImportDraft
  onDraft: (draft: ImportDraft) => void
  faults: ImportFieldFaults
  knownOptics: readonly KnownOptics[]
}

/** How a displacement in the file's unit becomes arc seconds on the axis. */
export function ScaleFields({ draft, onDraft, faults, knownOptics }: ScaleFieldsProps) {
  const { conversion, scaleFrom, optics } = draft
  const change = (part: Partial<typeof conversion>) => onDraft({ ...draft, conversion: { ...conversion, ...part } })
  const isPixels = conversion.displacementUnit === 'px'
  const isAxisAlready = conversion.displacementUnit === 'ra-seconds'
  return (
    <FieldGroup
      legend="Scale"
      hint={
        isAxisAlready
          ? 'Seconds of right ascension are on the axis already: 1 s is 15″. Nothing more is needed.'
          : undefined
      }
    >
      {isPixels ? (
        <>
          <Segmented
            label="Image scale from"
            value={scaleFrom}
            options={[
              { value: 'direct', label: 'Known or measured' },
              { value: 'optics', label: 'From focal length' },
            ]}
            onValue={(next) => onDraft(setScale(draft, { scaleFrom: next }))}
            className="self-start"
          />
          {knownOptics.length > 0 ? (
            <Field label="Optics of this project">
              {(control) => (
                <Select
                  {...control}
                  value=""
                  options={[
                    { value: '', label: 'Take the scale from…' },
                    ...knownOptics.map(({ id, name }) => ({ value: id, label: name })),
                  ]}
                  onChange={(event) => {
                    const chosen = knownOptics.find(({ id }) => id === event.target.value)
                    if (!chosen) return
                    const { imageScaleArcsecPerPx: directScaleArcsecPerPx, imageScaleUncertaintyPercent } = chosen
                    const next = { ...draft, conversion: { ...conversion, imageScaleUncertaintyPercent } }
                    onDraft(setScale(next, { scaleFrom: 'direct', directScaleArcsecPerPx }))
                  }}
                />
              )}
            </Field>
          ) : null}
          {scaleFrom === 'direct' ? (
            <NumberField
              label="Image scale"
              unit="″/px"
              value={draft.directScaleArcsecPerPx}
              onValue={(directScaleArcsecPerPx) => onDraft(setScale(draft, { directScaleArcsecPerPx }))}
              error={faults.imageScale}
              min={0.000_001}
              max={1000}
            />
          ) : (
            <>
              <div className="grid grid-cols-3 gap-3 max-sm:grid-cols-1">
                <NumberField
                  label="Focal length"
                  unit="mm"
                  value={optics.focalLengthMillimetres}
                  onValue={(focalLengthMillimetres) =>
                    onDraft(setScale(draft, { optics: { ...optics, focalLengthMillimetres } }))
                  }
                  error={faults.imageScale}
                  min={1}
                  max={100_000}
                />
                <NumberField
                  label="Pixel size"
                  unit="µm"
                  value={optics.pixelSizeMicrometres}
                  onValue={(pixelSizeMicrometres) =>
                    onDraft(setScale(draft, { optics: { ...optics, pixelSizeMicrometres } }))
                  }
                  min={0.1}
                  max={1000}
                />
                <NumberField
                  label="Binning"
                  value={optics.binning}
                  onValue={(binning) => onDraft(setScale(draft, { optics: { ...optics, binning } }))}
                  isInteger
                  min={1}
                  max={16}
                />
              </div>
              <p aria-live="polite">
                {conversion.imageScaleArcsecPerPx === null ? (
                  <span className="text-soft">These three give the image scale.</span>
                ) : (
                  <>
                    Image scale{' '}
                    <span className="figures text-brass">
                      {formatSignificant(conversion.imageScaleArcsecPerPx, 5, { unit: '″/px' })}
                    </span>
                  </>
                )}
              </p>
            </>
          )}
          <NumberField
            label="Uncertainty of the image scale"
            unit="%"
            hint="About 1 % for a focal length from the label, 0.2 % for a measured scale. It scales every figure alike."
            value={conversion.imageScaleUncertaintyPercent}
            onValue={(imageScaleUncertaintyPercent) => change({ imageScaleUncertaintyPercent })}
            min={0}
            max={100}
          />
        </>
      ) : null}
      {isAxisAlready ? null : (
        <>
          <Field
            label="The displacement is measured"
            hint="A camera sees the sky; an encoder or a solver that gives right ascension sees the axis."
          >
            {(control) => (
              <Select
                {...control}
                value={conversion.frame}
                options={[
                  { value: 'sky', label: 'on the sky' },
                  { value: 'axis', label: 'on the axis' },
                ]}
                onChange={(event) => change({ frame: event.target.value === 'axis' ? 'axis' : 'sky' })}
              />
            )}
          </Field>
          {conversion.frame === 'sky' ? (
            <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
              <NumberField
                label="Declination of the field"
                unit="°"
                value={conversion.declinationDegrees}
                onValue={(declinationDegrees) => change({ declinationDegrees })}
                error={faults.declination}
                min={-88.99}
                max={88.99}
              />
              <NumberField
                label="Its uncertainty"
                unit="°"
                hint="Empty: taken as exact."
                value={conversion.declinationUncertaintyDegrees}
                onValue={(declinationUncertaintyDegrees) => change({ declinationUncertaintyDegrees })}
                min={0}
                max={90}
              />
            </div>
          ) : null}
        </>
      )}
    </FieldGroup>
  )
}
