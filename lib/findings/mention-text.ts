/** Somebody who can be named in a note. */
export interface NamedPerson {
  userId: string
  displayName: string
}

/** A piece of a note’s text: with a person, it is the “@Name” of that one. */
export interface TextPiece {
  text: string
  person: NamedPerson | null
}

/** Whether a name may end here: “@Ann” is not named in “@Anna”. */
const GOES_ON = /[\p{L}\p{N}_]/u

/** Cuts a text at the names in it. Where two people share a name, the first of them counts. */
export function splitMentions(text: string, people: readonly NamedPerson[]): TextPiece[] {
  const longestFirst = [...people].sort((a, b) => b.displayName.length - a.displayName.length)
  const pieces: TextPiece[] = []
  let plainFrom = 0
  for (let at = text.indexOf('@'); at !== -1; at = text.indexOf('@', at + 1)) {
    if (at > 0 && GOES_ON.test(text[at - 1])) continue
    const person = longestFirst.find(
      ({ displayName }) =>
        text.startsWith(displayName, at + 1) && !GOES_ON.test(text[at + 1 + displayName.length] ?? ' '),
    )
    if (!person) continue
    if (at > plainFrom) pieces.push({ text: text.slice(plainFrom, at), person: null })
    plainFrom = at + 1 + person.displayName.length
    pieces.push({ text: text.slice(at, plainFrom), person })
  }
  if (plainFrom < text.length) pieces.push({ text: text.slice(plainFrom), person: null })
  return pieces
}

/** Whom a text names, among these people; of several with one name those that were chosen from the list, if any. */
export function mentionedIn(
  text: string,
  { people, chosenIds }: { people: readonly NamedPerson[]; chosenIds: readonly string[] },
): string[] {
  const chosen = new Set(chosenIds)
  const ids = new Set<string>()
  for (const { person } of splitMentions(text, people)) {
    if (!person) continue
    const sameName = people.filter(({ displayName }) => displayName === person.displayName)
    const meant = sameName.filter(({ userId }) => chosen.has(userId))
    for (const { userId } of meant.length > 0 ? meant : [person]) ids.add(userId)
  }
  return [...ids]
}

/** What stands between the last “@” before the caret and the caret, while it may become a name; else null. */
export function mentionBeingTyped(text: string, caret: number): { at: number; query: string } | null {
  const at = text.lastIndexOf('@', caret - 1)
  if (at === -1 || (at > 0 && GOES_ON.test(text[at - 1]))) return null
  const query = text.slice(at + 1, caret)
  return query.length > 40 || /[\n@]/.test(query) ? null : { at, query }
}

/** People any word of whose name begins with what was typed. */
export function peopleFor(query: string, people: readonly NamedPerson[]): NamedPerson[] {
  const wanted = plain(query)
  return people.filter(({ displayName }) => {
    const name = plain(displayName)
    return name.startsWith(wanted) || name.split(' ').some((word) => word.startsWith(wanted))
  })
}

function plain(text: string): string {
  return text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase()
}
