import type { Emphasis, Finding } from '@/lib/findings/finding'

const colours: Record<Emphasis, string> = { worm: 'text-brass', line: 'text-verdigris', limit: 'text-oxide' }

/** A finding in words, its figures in the colour of what they are about. */
export function FindingText({ finding }: { finding: Finding }) {
  return finding.map(({ text, emphasis }, index) =>
    emphasis ? (
      <span key={index} className={colours[emphasis]}>
        {text}
      </span>
    ) : (
      text
    ),
  )
}
