'use client'

import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { SaveTroubles } from '@/components/projects/save-troubles'
import { useSave } from '@/components/projects/use-save'
import { Button } from '@/components/ui/button'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { TextInput } from '@/components/ui/text-input'
import { sendJson } from '@/lib/client/fetcher'
import { analysisChangeSchema, analysisSchema, type Analysis } from '@/lib/schemas/api'

interface RenameAnalysisProps {
  analysis: Analysis
  isOpen: boolean
  onClose: () => void
}

/** The one thing about a saved analysis that may change. */
export function RenameAnalysis({ analysis, isOpen, onClose }: RenameAnalysisProps) {
  return (
    <Dialog isOpen={isOpen} onClose={onClose} title="Rename this analysis">
      <RenameForm analysis={analysis} onClose={onClose} />
    </Dialog>
  )
}

function RenameForm({ analysis, onClose }: Omit<RenameAnalysisProps, 'isOpen'>) {
  const router = useRouter()
  const [name, setName] = useState(analysis.name)
  // What was read when the dialog was opened: the page may learn of a newer name meanwhile.
  const [version] = useState(analysis.version)
  const [nameFault, setNameFault] = useState<string | null>(null)
  const { save, isBusy, fault, fields, conflict } = useSave(analysisSchema)

  function done() {
    onClose()
    router.refresh()
  }

  async function send(from: number) {
    const parsed = analysisChangeSchema.shape.name.safeParse(name)
    setNameFault(parsed.success ? null : parsed.error.issues[0].message)
    if (!parsed.success) return
    const url = `/api/projects/${analysis.projectId}/analyses/${analysis.id}`
    const saved = await save(() => sendJson('PATCH', url, { version: from, name: parsed.data }, analysisSchema))
    if (saved) done()
  }

  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault()
        void send(version)
      }}
    >
      <Field label="Name of the analysis" error={nameFault ?? fields.name}>
        {(control) => (
          <TextInput {...control} value={name} autoComplete="off" onChange={(event) => setName(event.target.value)} />
        )}
      </Field>
      <SaveTroubles
        thing="this analysis"
        fault={fields.name ? null : fault}
        conflict={conflict}
        theirs={(theirs) => `“${theirs.name}”`}
        onKeepMine={(theirs) => void send(theirs.version)}
        onTakeTheirs={done}
      />
      <Actions className="mt-0">
        <Button onClick={onClose}>Not now</Button>
        <Button type="submit" variant="primary" disabled={isBusy}>
          Save the name
        </Button>
      </Actions>
    </form>
  )
}
