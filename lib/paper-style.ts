/** What stands in the margins of each printed page. */
export interface PaperWords {
  /** At the upper left, from the second page on: the title block says it on the first. */
  topLeft: string
  topRight: string
  bottomLeft: string
}

const LONGEST = 60

/**
 * The style sheet of a printed report: margins that hold on A4 and Letter, running heads, page numbers. The words come
 * from people, so every character but plain letters, digits and spaces is written as its number: nothing ends the string.
 */
export function paperStyle({ topLeft, topRight, bottomLeft }: PaperWords): string {
  const box = "font: 8.5pt 'Atkinson Hyperlegible Next Variable', sans-serif; color: #54625d;"
  return [
    '@page {',
    'margin: 17mm 16mm 16mm;',
    `@top-left { content: ${cssString(topLeft)}; ${box} }`,
    `@top-right { content: ${cssString(topRight)}; ${box} text-align: right; }`,
    `@bottom-left { content: ${cssString(bottomLeft)}; ${box} }`,
    `@bottom-right { content: 'Page ' counter(page) ' of ' counter(pages); ${box} }`,
    '}',
    '@page :first { @top-left { content: none } @top-right { content: none } }',
  ].join('\n')
}

function cssString(text: string): string {
  const letters = [...text]
  const short = letters.length > LONGEST ? [...letters.slice(0, LONGEST - 1), '…'] : letters
  return `"${short.map((letter) => (/[A-Za-z0-9 ]/.test(letter) ? letter : `\\${letter.codePointAt(0)!.toString(16)} `)).join('')}"`
}
