import { Fragment } from 'react'
import { splitMentions, type NamedPerson } from '@/lib/findings/mention-text'

/** A note’s text as it was typed; who is named in it stands out by weight and underline. */
export function NoteWords({ text, mentions }: { text: string; mentions: readonly NamedPerson[] }) {
  return splitMentions(text, mentions).map((piece, index) =>
    piece.person ? (
      <strong key={index} className="font-semibold underline decoration-plum decoration-2 underline-offset-2">
        {piece.text}
      </strong>
    ) : (
      <Fragment key={index}>{piece.text}</Fragment>
    ),
  )
}
