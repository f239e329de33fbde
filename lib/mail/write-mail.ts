import { letterFor } from './letter-for'
import { letterHtml } from './letter-html'
import { letterText } from './letter-text'
import type { MailFacts } from './mail-facts'

export interface WrittenMail {
  subject: string
  text: string
  html: string
}

/** @param origin where the links lead: scheme, host and port, without a slash at its end */
export function writeMail(facts: MailFacts, origin: string): WrittenMail {
  const letter = letterFor(facts, origin)
  return { subject: letter.subject, text: letterText(letter), html: letterHtml(letter) }
}
