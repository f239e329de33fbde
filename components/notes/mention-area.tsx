'use client'

import { useId, useLayoutEffect, useRef, useState, type KeyboardEvent } from 'react'
import { classNames } from '@/components/ui/class-names'
import { TextArea } from '@/components/ui/text-input'
import { mentionBeingTyped, peopleFor, type NamedPerson } from '@/lib/findings/mention-text'

const MOST_SHOWN = 6

interface MentionAreaProps {
  label: string
  value: string
  people: readonly NamedPerson[]
  isFocusedFirst: boolean
  faultId?: string
  /** With who was taken from the list, if that is what changed the text. */
  onValue: (text: string, chosen?: NamedPerson) => void
}

/** A text in which “@” offers the members of the project; the focus stays in the text while one is chosen. */
export function MentionArea(props: MentionAreaProps) {
  const { label, value, people, isFocusedFirst, faultId, onValue } = props
  const area = useRef<HTMLTextAreaElement>(null)
  const listId = useId()
  const [caret, setCaret] = useState<number | null>(null)
  /** Where a list was closed with Escape: it stays closed for that “@”. */
  const [closedAt, setClosedAt] = useState<number | null>(null)
  const [index, setIndex] = useState(0)
  const [nextCaret, setNextCaret] = useState<number | null>(null)
  const typed = caret === null ? null : mentionBeingTyped(value, caret)
  const offered = typed && typed.at !== closedAt ? peopleFor(typed.query, people).slice(0, MOST_SHOWN) : []
  const isOpen = offered.length > 0
  const active = Math.min(index, offered.length - 1)
  const optionId = (at: number) => `${listId}-${at}`

  useLayoutEffect(() => {
    if (nextCaret !== null) area.current?.setSelectionRange(nextCaret, nextCaret)
  }, [nextCaret])

  function choose(person: NamedPerson) {
    if (!typed) return
    const before = `${value.slice(0, typed.at)}@${person.displayName} `
    onValue(before + value.slice(caret ?? value.length).replace(/^ /, ''), person)
    setNextCaret(before.length)
    setCaret(null)
    area.current?.focus()
  }

  function onKeyDown(event: KeyboardEvent) {
    if (!isOpen || event.nativeEvent.isComposing) return
    if (event.key === 'ArrowDown') setIndex((active + 1) % offered.length)
    else if (event.key === 'ArrowUp') setIndex((active + offered.length - 1) % offered.length)
    else if (event.key === 'Enter' || event.key === 'Tab') choose(offered[active])
    else if (event.key === 'Escape') setClosedAt(typed?.at ?? null)
    else return
    event.preventDefault()
    event.stopPropagation()
  }

  return (
    <>
      <TextArea
        ref={area}
        aria-label={label}
        aria-describedby={faultId}
        aria-invalid={faultId ? true : undefined}
        aria-autocomplete="list"
        aria-haspopup="listbox"
        aria-controls={isOpen ? listId : undefined}
        aria-activedescendant={isOpen ? optionId(active) : undefined}
        autoFocus={isFocusedFirst}
        rows={4}
        maxLength={4000}
        className="resize-none text-sm"
        value={value}
        onChange={(event) => {
          onValue(event.target.value)
          setCaret(event.target.selectionStart)
          setNextCaret(null)
          setIndex(0)
          if (closedAt !== null && event.target.value[closedAt] !== '@') setClosedAt(null)
        }}
        onSelect={(event) => {
          const { selectionStart } = event.currentTarget
          setCaret((now) => (now === null ? null : selectionStart))
        }}
        onBlur={() => setCaret(null)}
        onKeyDown={onKeyDown}
      />
      {isOpen ? (
        <ul
          id={listId}
          role="listbox"
          aria-label="Members to name"
          className="mt-1 overflow-hidden rounded-control border border-rule bg-card text-sm"
        >
          {offered.map((person, at) => (
            <li
              key={person.userId}
              id={optionId(at)}
              role="option"
              aria-selected={at === active}
              // The focus stays in the text.
              onPointerDown={(event) => event.preventDefault()}
              onMouseDown={(event) => event.preventDefault()}
              onClick={() => choose(person)}
              className={classNames(
                'flex cursor-pointer items-center border-l-3 px-2 py-1 hover:bg-faint pointer-coarse:min-h-11',
                at === active ? 'border-plum bg-faint font-semibold' : 'border-transparent',
              )}
            >
              {person.displayName}
            </li>
          ))}
        </ul>
      ) : null}
      <span className="sr-only" role="status">
        {isOpen
          ? `${offered.length} to choose from with the arrow keys; Enter takes ${offered[active].displayName}`
          : ''}
      </span>
    </>
  )
}
