'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { TextArea } from '@/components/ui/text-input'

interface PasteBoxProps {
  onText: (text: string) => void
  isBusy: boolean
}

/** Rows copied from a spreadsheet or an editor. What was pasted stays until the box is closed. */
export function PasteBox({ onText, isBusy }: PasteBoxProps) {
  const [text, setText] = useState('')
  const [isTried, setTried] = useState(false)
  const isEmpty = text.trim() === ''
  return (
    <div className="flex flex-col gap-2">
      <Field
        label="Rows of the recording"
        hint="With or without a header row; columns parted by tabs, commas, semicolons or blanks."
        error={isTried && isEmpty ? 'Paste the rows first' : null}
      >
        {(control) => (
          <TextArea
            {...control}
            rows={8}
            className="font-mono"
            spellCheck={false}
            value={text}
            onChange={(event) => setText(event.target.value)}
          />
        )}
      </Field>
      <Button
        className="self-end"
        disabled={isBusy}
        onClick={() => {
          setTried(true)
          if (!isEmpty) onText(text)
        }}
      >
        Use this text
      </Button>
    </div>
  )
}
