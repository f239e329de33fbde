import { expect, test } from 'vitest'
import { paperStyle } from '@/lib/paper-style'

const words = { topLeft: 'Hillside', topRight: 'Night 3', bottomLeft: 'Shown to whoever has the link' }

/** The string of a margin box as a browser reads it. */
function contentOf(style: string, box: string): string | undefined {
  const literal = new RegExp(`@${box} \\{ content: "([^"]*)";`).exec(style)?.[1]
  return literal?.replace(/\\([0-9a-f]{1,6}) ?/g, (_, code: string) => String.fromCodePoint(parseInt(code, 16)))
}

test('each corner says its own words, and the pages are counted', () => {
  const style = paperStyle(words)
  expect(contentOf(style, 'top-left')).toBe('Hillside')
  expect(contentOf(style, 'top-right')).toBe('Night 3')
  expect(contentOf(style, 'bottom-left')).toBe('Shown to whoever has the link')
  expect(style).toContain("content: 'Page ' counter(page) ' of ' counter(pages)")
})

test('the first page has no running heads: its title block says the same', () => {
  expect(paperStyle(words)).toMatch(/@page :first \{ @top-left \{ content: none \} @top-right \{ content: none \} \}$/)
})

test.each([
  ['a quote and a brace', '"; } body { display: none } /*'],
  ['the end of a style element', '</style><script>alert(1)</script>'],
  ['a backslash and a line break', 'a\\\nb'],
  ['digits behind an escaped letter', 'é1 ″2'],
  ['a letter beyond the first plane', '🔭 Hillside'],
])('%s stays a text', (_, topLeft) => {
  const style = paperStyle({ ...words, topLeft })
  expect(contentOf(style, 'top-left')).toBe(topLeft)
  const literal = /@top-left \{ content: "([^"]*)";/.exec(style)?.[1]
  expect(literal).toMatch(/^[A-Za-z0-9 \\]*$/)
  expect(style.split('\n')).toHaveLength(paperStyle(words).split('\n').length)
})

test('long words are cut at sixty letters, whole ones', () => {
  const style = paperStyle({ ...words, topLeft: '🔭'.repeat(61) })
  expect(contentOf(style, 'top-left')).toBe(`${'🔭'.repeat(59)}…`)
  expect(contentOf(paperStyle({ ...words, topLeft: 'x'.repeat(60) }), 'top-left')).toBe('x'.repeat(60))
})
