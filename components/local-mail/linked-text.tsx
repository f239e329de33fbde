import { Fragment } from 'react'
import { splitAtAddresses } from '@/lib/mail/addresses-in'

/** The text part of a mail as it is, its addresses as links that open in this tab. */
export function LinkedText({ text }: { text: string }) {
  return (
    <pre className="font-mono text-sm break-words whitespace-pre-wrap">
      {splitAtAddresses(text).map(({ part, isAddress }, index) =>
        isAddress ? (
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
