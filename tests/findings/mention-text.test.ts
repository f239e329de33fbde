import { describe, expect, test } from 'vitest'
import { mentionBeingTyped, mentionedIn, splitMentions } from '@/lib/findings/mention-text'

const ANN = { userId: 'ann', displayName: 'Ann' }
const ANN_LEE = { userId: 'lee', displayName: 'Ann Lee' }
const OTHER_ANN = { userId: 'other', displayName: 'Ann' }

describe('names in a text', () => {
  test.each([
    ['@Ann', ['ann']],
    ['(@Ann), twice: @Ann', ['ann']],
    ['@Ann Lee and @Ann', ['lee', 'ann']],
    ['@Annabel', []],
    ['mail@Ann', []],
    ['Ann', []],
    ['@', []],
  ])('%s', (text, expected) => {
    expect(mentionedIn(text, { people: [ANN, ANN_LEE], chosenIds: [] })).toEqual(expected)
    expect(
      splitMentions(text, [ANN, ANN_LEE])
        .map((piece) => piece.text)
        .join(''),
    ).toBe(text)
  })

  test('of two people with one name the chosen one is meant', () => {
    const people = [ANN, OTHER_ANN]
    expect(mentionedIn('@Ann', { people, chosenIds: ['other'] })).toEqual(['other'])
    expect(mentionedIn('@Ann', { people, chosenIds: [] })).toEqual(['ann'])
    expect(mentionedIn('nobody', { people, chosenIds: ['other'] })).toEqual([])
  })
})

test.each([
  ['Ask @an', 7, { at: 4, query: 'an' }],
  ['Ask @an', 5, { at: 4, query: '' }],
  ['Ask @an', 4, null],
  ['mail a@b', 8, null],
  ['@a\nb', 4, null],
  ['no', 2, null],
])('what is being typed in %j at %i', (text, caret, expected) => {
  expect(mentionBeingTyped(text, caret)).toEqual(expected)
})
