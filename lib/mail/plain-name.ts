const LONGEST_NAME = 120

/**
 * A name that somebody typed, made fit for subjects and sentences of a mail that goes to somebody else: one line, nothing
 * invisible, and nothing that a mail program would turn into a link, so that an invitation can't carry another's address.
 */
export function plainName(text: string): string {
  const line = text
    .normalize('NFC')
    .replace(/[\p{Cc}\p{Zl}\p{Zp}\s]+/gu, ' ')
    .replace(/[\p{Cf}\p{Co}\p{Cs}]/gu, '')
    .replaceAll('://', ': //')
    .replace(/(?<=[\p{L}\p{N}])\.(?=\p{L}{2})/gu, '. ')
    .trim()
  const letters = Array.from(line)
  return letters.length > LONGEST_NAME ? `${letters.slice(0, LONGEST_NAME - 1).join('')}…` : line
}
