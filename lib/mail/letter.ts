/** A mail before it is set as text or as HTML. All of it is plain text; whoever sets it escapes. */
export interface Letter {
  subject: string
  /** The one sentence that says what is so. */
  title: string
  /** Null where the address has not been proven to be its person's. */
  greeting: string | null
  paragraphs: string[]
  /** Somebody's own words, kept apart from ours. */
  quote: string | null
  link: { label: string; url: string } | null
  /** How long the link holds. */
  validity: string | null
  /** Why one got this, and what to do if it was not oneself. */
  reason: string
}
