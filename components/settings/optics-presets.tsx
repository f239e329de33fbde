'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { ConfirmByName } from '@/components/ui/confirm-by-name'
import { Dialog } from '@/components/ui/dialog'
import { sendOnly } from '@/lib/client/fetcher'
import type { OpticsPreset } from '@/lib/client/project-data'
import { formatNumber } from '@/lib/units'
import { OpticsForm } from './optics-form'

interface OpticsPresetsProps {
  projectId: string
  presets: readonly OpticsPreset[]
  /** Why nothing can be changed here; null where it can. */
  whyReadOnly: string | null
  onChanged: () => void
}

export function OpticsPresets({ projectId, presets, whyReadOnly, onChanged }: OpticsPresetsProps) {
  const [edited, setEdited] = useState<OpticsPreset | 'new' | null>(null)
  const [removed, setRemoved] = useState<OpticsPreset | null>(null)
  const url = `/api/projects/${projectId}/optics-presets`

  return (
    <>
      {presets.length === 0 ? (
        <p className="text-soft">
          Nothing is kept.{' '}
          {whyReadOnly === null ? 'Runs can still be brought in; each then asks for its image scale in ″/px.' : null}
        </p>
      ) : (
        <ul>
          {presets.map((preset) => (
            <li
              key={preset.id}
              className="flex flex-wrap items-center justify-between gap-x-6 gap-y-1 border-b border-rule py-2.5 first:pt-0"
            >
              <span className="min-w-0 wrap-anywhere">
                <span className="font-semibold">{preset.name}</span>
                <span className="figures ml-3 text-sm">
                  {formatNumber(preset.imageScaleArcsecPerPx, 3, { unit: '″/px' })}
                  <span className="text-soft">
                    {' '}
                    ± {formatNumber(preset.imageScaleUncertaintyPercent, 1, { unit: '%' })}
                  </span>
                </span>
                <span className="block text-sm text-soft">{opticsText(preset)}</span>
              </span>
              {whyReadOnly === null ? (
                <span className="flex gap-2">
                  <Button onClick={() => setEdited(preset)} aria-label={`Change ${preset.name}`}>
                    Change
                  </Button>
                  <Button onClick={() => setRemoved(preset)} aria-label={`Remove ${preset.name}`}>
                    Remove
                  </Button>
                </span>
              ) : null}
            </li>
          ))}
        </ul>
      )}
      {whyReadOnly === null ? (
        <div className="mt-4">
          <Button onClick={() => setEdited('new')}>Add optics</Button>
        </div>
      ) : (
        <p className="mt-4 text-sm text-soft">{whyReadOnly}</p>
      )}

      <Dialog
        isOpen={edited !== null}
        onClose={() => setEdited(null)}
        title={edited === 'new' || edited === null ? 'New optics' : `Change ${edited.name}`}
      >
        <OpticsForm
          url={url}
          preset={edited === 'new' ? null : edited}
          onClose={() => setEdited(null)}
          onSaved={() => {
            setEdited(null)
            onChanged()
          }}
        />
      </Dialog>
      <ConfirmByName
        isOpen={removed !== null}
        onClose={() => setRemoved(null)}
        title="Remove these optics?"
        name={removed?.name ?? ''}
        confirmLabel="Remove"
        onConfirm={async () => {
          if (!removed) return
          await sendOnly('DELETE', `${url}/${removed.id}`)
          setRemoved(null)
          onChanged()
        }}
      >
        The image scale and its uncertainty are no longer offered for new runs. Runs that used them keep their own copy.
      </ConfirmByName>
    </>
  )
}

function opticsText({ focalLengthMm, pixelSizeUm, binning }: OpticsPreset): string {
  const parts = [
    focalLengthMm === null ? null : `focal length ${formatNumber(focalLengthMm, 0, { unit: 'mm' })}`,
    pixelSizeUm === null ? null : `pixels of ${formatNumber(pixelSizeUm, 2, { unit: 'µm' })}`,
    binning === null ? null : `binning ${binning}`,
  ].filter((part) => part !== null)
  return parts.length === 0 ? 'image scale measured' : parts.join(', ')
}
