import type { Letter } from './letter'
import { MACHINE_SENTENCE } from './letter-text'

/** Day and Dusk of app/globals.css, written out: mail programs know no variables. */
const DAY = {
  sheet: '#eff2ec',
  card: '#fbfcf8',
  rule: '#d3dad0',
  ink: '#16211e',
  soft: '#54625d',
  brass: '#96640c',
  brassFill: '#d9a43f',
}
const DUSK = {
  sheet: '#12191a',
  card: '#1a2324',
  rule: '#2f3c3d',
  ink: '#e6eae1',
  soft: '#9daaa4',
  brass: '#e0ac4c',
}

const FONT = "'Atkinson Hyperlegible Next','Atkinson Hyperlegible',Verdana,'Segoe UI',Helvetica,Arial,sans-serif"

/** Programs that darken mails by themselves are told that this one can be dark; the rest show the inline colours. */
const DARK_STYLE = `@media (prefers-color-scheme: dark) {
  .sheet { background: ${DUSK.sheet} !important; }
  .card { background: ${DUSK.card} !important; border-color: ${DUSK.rule} !important; }
  .ink { color: ${DUSK.ink} !important; }
  .soft { color: ${DUSK.soft} !important; }
  .brass { color: ${DUSK.brass} !important; }
  .rule { border-color: ${DUSK.rule} !important; }
  .button { background: ${DUSK.ink} !important; color: ${DUSK.sheet} !important; }
}`

const ESCAPES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }

function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (letter) => ESCAPES[letter])
}

function paragraph(
  text: string,
  className = 'ink',
  style = `color:${DAY.ink};font-size:16px;line-height:24px`,
): string {
  return `<p class="${className}" style="margin:0 0 14px;${style}">${escapeHtml(text)}</p>`
}

function quotation(text: string): string {
  const lines = escapeHtml(text).replace(/\r\n?|\n/g, '<br>')
  return `<blockquote class="ink" style="margin:0 0 18px;padding:2px 0 2px 14px;border-left:3px solid ${DAY.brassFill};color:${DAY.ink};font-size:16px;line-height:24px">${lines}</blockquote>`
}

/** A button that is a plain link with padding, and below it the address, for those whose program shows no buttons. */
function linkBlock({ label, url }: NonNullable<Letter['link']>): string {
  const address = escapeHtml(url)
  return `<table role="presentation" cellpadding="0" cellspacing="0" border="0" style="margin:6px 0 16px"><tr>
<td class="button" style="border-radius:6px;background:${DAY.ink}"><a class="button" href="${address}" style="display:inline-block;padding:11px 20px;border-radius:6px;background:${DAY.ink};color:${DAY.sheet};font-size:16px;line-height:22px;font-weight:600;text-decoration:none">${escapeHtml(label)}</a></td>
</tr></table>
<p class="soft" style="margin:0 0 14px;color:${DAY.soft};font-size:14px;line-height:20px">Or copy this address into your browser:<br><a class="brass" href="${address}" style="color:${DAY.brass};word-break:break-all">${address}</a></p>`
}

/** The part for everyone else: tables and inline styles, which is what mail programs agree on; nothing is fetched. */
export function letterHtml({ subject, title, greeting, paragraphs, quote, link, validity, reason }: Letter): string {
  const small = `color:${DAY.soft};font-size:14px;line-height:20px`
  const body = [
    greeting ? paragraph(greeting) : '',
    ...paragraphs.map((text) => paragraph(text)),
    quote ? quotation(quote) : '',
    link ? linkBlock(link) : '',
    validity ? paragraph(validity) : '',
  ]
  return `<!doctype html>
<html lang="en" dir="ltr">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<meta name="supported-color-schemes" content="light dark">
<title>${escapeHtml(subject)}</title>
<style>
${DARK_STYLE}
</style>
</head>
<body class="sheet" style="margin:0;padding:0;background:${DAY.sheet}">
<div style="display:none;max-height:0;max-width:0;overflow:hidden;font-size:1px;line-height:1px;opacity:0">${escapeHtml(preheader(paragraphs, validity))}</div>
<table role="presentation" class="sheet" width="100%" cellpadding="0" cellspacing="0" border="0" style="background:${DAY.sheet}"><tr><td align="center" style="padding:28px 14px">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" border="0" style="max-width:560px;font-family:${FONT};overflow-wrap:anywhere;word-break:break-word">
<tr><td class="ink" style="padding:0 4px 14px;color:${DAY.ink};font-size:18px;line-height:24px;font-weight:600"><span class="brass" style="color:${DAY.brass}" aria-hidden="true">∿</span>&nbsp;Turnwright</td></tr>
<tr><td class="card" align="left" style="padding:26px 24px 14px;background:${DAY.card};border:1px solid ${DAY.rule};border-radius:10px">
<h1 class="ink" style="margin:0 0 16px;color:${DAY.ink};font-size:23px;line-height:29px;font-weight:640">${escapeHtml(title)}</h1>
${body.filter(Boolean).join('\n')}
</td></tr>
<tr><td align="left" style="padding:16px 4px 0">
${paragraph(reason, 'soft', small)}
${paragraph(MACHINE_SENTENCE, 'soft', small)}
</td></tr>
</table>
</td></tr></table>
</body>
</html>
`
}

/** What a list of mails shows behind the subject. */
function preheader(paragraphs: string[], validity: string | null): string {
  return [...paragraphs, validity].filter(Boolean).join(' ').slice(0, 140)
}
