import { Fragment } from 'react'

const ADDRESS = /(https?:\/\/\S+)/

/** The text part of a mail as it is, its addresses as links that open in this tab. */
export function LinkedText({ text }: { text: string }) {
  return (
    <pre className="font-mono text-sm break-words whitespace-pre-wrap">
      {text.split(ADDRESS).map((part, index) =>
        ADDRESS.test(part) ? (
          <a key={index} href={part} className="link break-all">
            {part}
          </a>
        ) : (
          <Fragment key={index}>{part}</Fragment>
        ),
      )}
    </pre>
  )
}
