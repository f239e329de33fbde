'use client'

import { useState, type ComponentProps } from 'react'
import { Button } from '@/components/ui/button'
import { TextInput } from '@/components/ui/text-input'

/** For a password that is being chosen: it can be looked at, so that it need not be typed twice. */
export function NewPasswordInput(props: Omit<ComponentProps<typeof TextInput>, 'type'>) {
  const [isShown, setShown] = useState(false)
  return (
    <span className="flex gap-2">
      <TextInput
        {...props}
        type={isShown ? 'text' : 'password'}
        autoComplete="new-password"
        className="min-w-0 flex-1"
      />
      <Button onClick={() => setShown(!isShown)}>
        {isShown ? 'Hide' : 'Show'}
        <span className="sr-only"> what is typed</span>
      </Button>
    </span>
  )
}
