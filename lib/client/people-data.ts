'use client'

import { useEffect } from 'react'
import useSWR from 'swr'
import type { z } from 'zod'
import { invitationListSchema } from '@/lib/schemas/people'
import { getJson } from './fetcher'

type InvitationList = z.output<typeof invitationListSchema>

export const invitationsUrl = (projectId: string) => `/api/projects/${projectId}/invitations`

/** While a mail is on its way the list is asked for again and again, less often once the mail server has failed. */
function refreshMs(list: InvitationList | undefined): number {
  const mails = list?.invitations.map(({ mail }) => mail) ?? []
  if (mails.includes('on-its-way')) return 2000
  return mails.includes('failing') ? 5000 : 0
}

/** Invitations that wait; only owners may ask, so nothing is asked for others. */
export function useInvitations(projectId: string, mayAsk: boolean) {
  const state = useSWR<InvitationList, Error>(mayAsk ? invitationsUrl(projectId) : null, (url: string) =>
    getJson(url, invitationListSchema),
  )
  const { data, mutate } = state
  const waitMs = refreshMs(data)
  // Not SWR's refreshInterval: once that has been zero it does not start again.
  useEffect(() => {
    if (waitMs === 0) return
    const timer = setInterval(() => void mutate(), waitMs)
    return () => clearInterval(timer)
  }, [waitMs, mutate])
  return state
}
