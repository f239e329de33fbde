import { classNames } from '@/components/ui/class-names'
import { formatMinute } from '@/lib/client/dates'
import type { LocalMailRow } from '@/lib/schemas/local-mail'

interface MailListProps {
  mails: readonly LocalMailRow[]
  selected: string
  onSelect: (name: string) => void
}

/** Newest first; each a button, since it opens beside the list. */
export function MailList({ mails, selected, onSelect }: MailListProps) {
  return (
    <ul
      aria-label="Mails"
      className="max-h-72 overflow-y-auto rounded-card border border-rule bg-card lg:max-h-[48rem]"
    >
      {mails.map(({ name, to, subject, at }) => (
        <li key={name} className="border-b border-rule last:border-b-0">
          <button
            type="button"
            aria-pressed={name === selected}
            onClick={() => onSelect(name)}
            className={classNames(
              'block w-full border-l-3 px-4 py-2.5 text-left -outline-offset-2',
              name === selected ? 'border-brass-fill bg-faint' : 'border-transparent hover:bg-faint',
            )}
          >
            <span className="block font-semibold wrap-anywhere">{subject}</span>
            <span className="block text-sm break-all text-soft">{to}</span>
            <span className="block text-sm text-soft">{formatMinute(at)}</span>
          </button>
        </li>
      ))}
    </ul>
  )
}
