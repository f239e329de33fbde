'use client'

import { useState } from 'react'
import useSWR from 'swr'
import { TitledCard } from '@/components/ui/card'
import { DataState } from '@/components/ui/data-state'
import { Segmented } from '@/components/ui/segmented'
import { formatDayAndTime } from '@/lib/client/dates'
import { getJson } from '@/lib/client/fetcher'
import { useTheme } from '@/lib/client/theme'
import { localMailSchema, type LocalMail } from '@/lib/schemas/local-mail'
import { LinkedText } from './linked-text'

const parts = [
  { value: 'html', label: 'As sent' },
  { value: 'text', label: 'As text' },
] as const

/** One mail in full. In Night the text part alone, since the other is white by nature. */
export function MailView({ name }: { name: string }) {
  const { data, error, mutate } = useSWR<LocalMail, Error>(`/api/local-mail/${name}`, (url: string) =>
    getJson(url, localMailSchema),
  )
  return (
    <DataState what="the mail" data={data} error={error} onRetry={() => void mutate()}>
      {(mail) => <MailParts mail={mail} />}
    </DataState>
  )
}

function MailParts({ mail }: { mail: LocalMail }) {
  const [chosen, setChosen] = useState<'html' | 'text'>('html')
  const isNight = useTheme() === 'night'
  const shown = isNight || !mail.hasHtml ? 'text' : chosen
  const choice = <Segmented<'html' | 'text'> label="Which part" value={shown} options={parts} onValue={setChosen} />
  return (
    <TitledCard title={mail.subject} actions={isNight ? null : choice}>
      <dl className="mb-4 grid grid-cols-[auto_1fr] gap-x-3 text-soft">
        <dt>From</dt>
        <dd className="break-all">{mail.from}</dd>
        <dt>To</dt>
        <dd className="break-all">{mail.to}</dd>
        <dt>Sent</dt>
        <dd>{formatDayAndTime(mail.at)} UTC</dd>
      </dl>
      {shown === 'html' ? (
        <iframe
          key={mail.name}
          src={`/api/local-mail/${mail.name}/html`}
          title={`Mail: ${mail.subject}`}
          sandbox="allow-top-navigation-by-user-activation"
          className="h-[42rem] w-full rounded-control border border-rule"
        />
      ) : (
        <LinkedText text={mail.text} />
      )}
      {isNight && mail.hasHtml ? (
        <p className="mt-4 text-soft">In Night only the text is shown; Day and Dusk show the mail as it was sent.</p>
      ) : null}
    </TitledCard>
  )
}
