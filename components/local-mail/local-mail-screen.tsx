'use client'

import { useState } from 'react'
import useSWR from 'swr'
import type { z } from 'zod'
import { PageHeading } from '@/components/shell/page-heading'
import { Button } from '@/components/ui/button'
import { Checkbox } from '@/components/ui/checkbox'
import { DataState } from '@/components/ui/data-state'
import { EmptyState } from '@/components/ui/empty-state'
import { Notice } from '@/components/ui/notice'
import { getJson, sendJson, sendOnly } from '@/lib/client/fetcher'
import { capitalised, counted } from '@/lib/findings/words'
import { localMailListSchema, localMailRefusingSchema } from '@/lib/schemas/local-mail'
import { MailList } from './mail-list'
import { MailView } from './mail-view'

const ADDRESS = '/api/local-mail'

type MailsAnswer = z.output<typeof localMailListSchema>

/** Every mail that the application sent while no mail server of one's own was set. */
export function LocalMailScreen() {
  const { data, error, mutate } = useSWR<MailsAnswer, Error>(
    ADDRESS,
    (url: string) => getJson(url, localMailListSchema),
    { refreshInterval: 3000 },
  )
  const [selected, setSelected] = useState<string | null>(null)
  const [fault, setFault] = useState<string | null>(null)

  /** Shows what is wanted at once, and what is so once the server has answered. */
  async function change(wanted: Partial<MailsAnswer>, work: () => Promise<unknown>) {
    setFault(null)
    const show = (shown: MailsAnswer | undefined) => ({ isRefusing: false, mails: [], ...shown, ...wanted })
    try {
      await mutate(
        work().then(() => undefined),
        { optimisticData: show, populateCache: false },
      )
    } catch (reason) {
      setFault(reason instanceof Error ? reason.message : String(reason))
    }
  }

  const setRefusing = (isRefusing: boolean) =>
    change({ isRefusing }, () => sendJson('PUT', `${ADDRESS}/refusing`, { isRefusing }, localMailRefusingSchema))

  const deleteAll = () => change({ mails: [] }, () => sendOnly('DELETE', ADDRESS))

  return (
    <DataState what="the mails" data={data} error={error} onRetry={() => void mutate()}>
      {({ mails, isRefusing }) => {
        const shown = mails.find(({ name }) => name === selected) ?? mails[0]
        return (
          <>
            <PageHeading
              title={finding(mails.length, isRefusing)}
              lead="No mail server is set (SMTP_URL), so mails go no further than this machine. This page takes the place of everybody’s mailbox while you try things out."
              actions={mails.length > 0 ? <Button onClick={() => void deleteAll()}>Delete all mails</Button> : null}
            />
            <Checkbox
              label="Let the mail server fail"
              hint="It then refuses every mail, as a server that is down would. What waits is sent by itself later."
              checked={isRefusing}
              onChange={(event) => void setRefusing(event.target.checked)}
            />
            {fault ? (
              <Notice tone="error" isLive title="This could not be done">
                {fault}
              </Notice>
            ) : null}
            {shown ? (
              <div className="grid items-start gap-5 lg:grid-cols-[22rem_minmax(0,1fr)]">
                <MailList mails={mails} selected={shown.name} onSelect={setSelected} />
                <MailView key={shown.name} name={shown.name} />
              </div>
            ) : (
              <EmptyState title="Nothing has been sent yet">
                Sign up, ask for a new password or invite somebody to a project: the mail appears here within seconds.
              </EmptyState>
            )}
          </>
        )
      }}
    </DataState>
  )
}

function finding(count: number, isRefusing: boolean): string {
  const lies = count === 1 ? 'lies' : 'lie'
  const kept = count === 0 ? 'No mail lies here' : `${capitalised(counted(count, 'mail', 'mails'))} ${lies} here`
  return isRefusing ? `${kept}, and the mail server refuses new ones` : kept
}
