'use client'

import { useState } from 'react'
import useSWR from 'swr'
import type { z } from 'zod'
import { Button } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { Notice } from '@/components/ui/notice'
import { useDates } from '@/lib/client/display'
import { getJson, sendOnly } from '@/lib/client/fetcher'
import { counted } from '@/lib/findings/words'
import { sessionListSchema, type AccountSession } from '@/lib/schemas/accounts'

export const SESSIONS_KEY = '/api/account/sessions'

export function SessionList() {
  const sessions = useSWR<z.output<typeof sessionListSchema>, Error>(SESSIONS_KEY, (url: string) =>
    getJson(url, sessionListSchema),
  )
  const [fault, setFault] = useState<string | null>(null)
  const [isBusy, setBusy] = useState(false)

  async function end(path: string) {
    setBusy(true)
    setFault(null)
    try {
      await sendOnly('DELETE', path)
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'Try again in a moment.')
    } finally {
      await sessions.mutate()
      setBusy(false)
    }
  }

  return (
    <DataState
      what="your sessions"
      data={sessions.data?.sessions}
      error={sessions.error}
      onRetry={() => void sessions.mutate()}
    >
      {(list) => {
        const otherCount = list.filter(({ isThis }) => !isThis).length
        return (
          <>
            <p role="status" className="mb-2 font-semibold">
              {otherCount === 0
                ? 'You are signed in here and nowhere else.'
                : `You are signed in here and in ${counted(otherCount, 'other session')}.`}
            </p>
            {fault ? (
              <Notice tone="error" title="That session may still be open" isLive className="mb-2">
                {fault}
              </Notice>
            ) : null}
            <ul className="max-w-2xl">
              {list.map((session) => (
                <SessionRow
                  key={session.id}
                  session={session}
                  isBusy={isBusy}
                  onEnd={() => void end(`${SESSIONS_KEY}/${session.id}`)}
                />
              ))}
            </ul>
            {otherCount > 1 ? (
              <Button className="mt-3" disabled={isBusy} onClick={() => void end(SESSIONS_KEY)}>
                End all others
              </Button>
            ) : null}
          </>
        )
      }}
    </DataState>
  )
}

function SessionRow({ session, isBusy, onEnd }: { session: AccountSession; isBusy: boolean; onEnd: () => void }) {
  const dates = useDates()
  const { device, createdAt, lastSeenAt, isThis } = session
  return (
    <li className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2 border-b border-rule py-2.5">
      <div className="min-w-0">
        <p className="font-medium">
          {device}
          {isThis ? <span className="font-normal text-brass"> · this one</span> : null}
        </p>
        <p className="text-sm text-soft">
          since {dates.dayAndTimeWithZone(createdAt)}
          {isThis ? null : `, last seen ${dates.dayAndTimeWithZone(lastSeenAt)}`}
        </p>
      </div>
      {isThis ? null : (
        <Button size="small" disabled={isBusy} onClick={onEnd}>
          End<span className="sr-only"> the session of {device}</span>
        </Button>
      )}
    </li>
  )
}
