'use client'

import { useRef, useState } from 'react'
import { Button, ButtonAnchor } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { TextInput } from '@/components/ui/text-input'
import { copyField } from '@/lib/client/copy-text'
import { useDates } from '@/lib/client/display'
import type { Dates } from '@/lib/client/dates'
import type { ShareLink } from '@/lib/schemas/share'
import { addressOf, stateOf } from './use-share-links'

interface ShareLinkEntryProps {
  link: ShareLink
  /** Left out where the link can only be revoked. */
  onChange?: () => void
  onRevoke: () => Promise<void>
}

/** One link: its address while it opens something, its story, and what can be done with it. */
export function ShareLinkEntry({ link, onChange, onRevoke }: ShareLinkEntryProps) {
  const dates = useDates()
  const field = useRef<HTMLInputElement>(null)
  const [copied, setCopied] = useState<string | null>(null)
  const [isAsking, setAsking] = useState(false)
  const [fault, setFault] = useState<string | null>(null)
  const state = stateOf(link, new Date())
  const name = `the link of ${dates.day(link.createdAt)}`

  async function copy() {
    if (!field.current) return
    setCopied((await copyField(field.current)) ? 'Copied' : 'Selected: press Ctrl+C')
  }

  async function revoke() {
    try {
      await onRevoke()
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'The link could not be revoked. Try again.')
    }
  }

  return (
    <li className="flex flex-col gap-2 border-t border-rule py-3">
      {state === 'revoked' ? null : (
        <div className="flex flex-wrap items-center gap-2">
          <TextInput
            ref={field}
            readOnly
            aria-label={`Address of ${name}`}
            value={addressOf(link)}
            className="figures min-w-48 flex-1 text-sm"
            onFocus={(event) => event.target.select()}
          />
          <Button onClick={() => void copy()} aria-label={`Copy ${name}`}>
            Copy
          </Button>
          <span role="status" className="text-sm text-soft empty:hidden">
            {copied}
          </span>
        </div>
      )}
      <p className="text-sm text-pretty text-soft">{storyOf(link, dates, state)}</p>
      {state === 'revoked' ? null : isAsking ? (
        <Notice
          tone="warning"
          title="Revoke this link?"
          actions={
            <>
              <Button onClick={() => setAsking(false)}>Keep it</Button>
              <Button variant="danger" onClick={() => void revoke()}>
                Revoke the link
              </Button>
            </>
          }
        >
          Everyone who was given this link will no longer see the report: {readersOf(link, dates)} This can’t be taken
          back; a new link has another address. Members of the project see the analysis as before.
          {fault ? <span className="block text-oxide">{fault}</span> : null}
        </Notice>
      ) : (
        <div className="flex flex-wrap gap-2">
          {state === 'open' ? (
            <ButtonAnchor
              size="small"
              href={addressOf(link)}
              target="_blank"
              rel="noreferrer"
              aria-label={`Open ${name} in a new tab`}
            >
              Open
            </ButtonAnchor>
          ) : null}
          {onChange ? (
            <Button size="small" onClick={onChange} aria-label={`Change ${name}`}>
              Change
            </Button>
          ) : null}
          <Button size="small" variant="danger" onClick={() => setAsking(true)} aria-label={`Revoke ${name}`}>
            Revoke
          </Button>
        </div>
      )}
    </li>
  )
}

function storyOf(link: ShareLink, dates: Dates, state: ReturnType<typeof stateOf>): string {
  const { createdBy, createdAt, expiresAt, revokedAt, noteIds } = link
  const until = {
    open: expiresAt === null ? 'Open until it is revoked.' : `Open until ${dates.minute(expiresAt)}.`,
    expired: `Ended on ${dates.minute(expiresAt)}; give it more time to open it again.`,
    revoked: `Revoked on ${dates.minute(revokedAt)}.`,
  }[state]
  const notes = noteIds.length === 0 ? 'no notes' : noteIds.length === 1 ? 'one note' : `${noteIds.length} notes`
  return `${until} Made by ${createdBy} on ${dates.day(createdAt)}, with ${notes}; ${openedText(link, dates)}.`
}

function openedText({ openedCount, lastOpenedAt }: ShareLink, dates: Dates): string {
  if (openedCount === 0) return 'not opened yet'
  return `opened ${openedCount === 1 ? 'once' : `${openedCount} times`}, last on ${dates.minute(lastOpenedAt)}`
}

function readersOf(link: ShareLink, dates: Dates): string {
  return link.openedCount === 0 ? 'nobody has opened it yet.' : `it was ${openedText(link, dates)}.`
}
