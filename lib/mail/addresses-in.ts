/** A web address in running text; the full stop of the sentence or the bracket behind it is not part of it. */
const ADDRESS = /(https?:\/\/\S*[^\s.,;:!?)”’>])/

/** The text in pieces, each either an address or what lies between two. */
export function splitAtAddresses(text: string): { part: string; isAddress: boolean }[] {
  return text.split(ADDRESS).map((part, index) => ({ part, isAddress: index % 2 === 1 }))
}

/** The addresses in their order, each once. */
export function addressesIn(text: string): string[] {
  const pieces = splitAtAddresses(text).filter(({ isAddress }) => isAddress)
  return [...new Set(pieces.map(({ part }) => part))]
}
