import type { Letter } from './letter'

export const MACHINE_SENTENCE = 'Turnwright sends these mails by itself; nobody reads an answer to them.'

/** The part for programs and people who read mail as text; complete on its own. */
export function letterText({ title, greeting, paragraphs, quote, link, validity, reason }: Letter): string {
  const quoted = quote?.split(/\r\n?|\n/).map((line) => `> ${line}`.trimEnd())
  const parts = [
    title,
    greeting,
    ...paragraphs,
    quoted?.join('\n'),
    link ? `${link.label}:\n${link.url}` : null,
    validity,
    '-- ',
    `${reason}\n${MACHINE_SENTENCE}`,
  ]
  return `${parts.filter((part) => part !== null && part !== undefined).join('\n\n')}\n`.replace('-- \n\n', '-- \n')
}
