'use client'

import useSWR from 'swr'
import { getJson, sendJson, sendOnly } from '@/lib/client/fetcher'
import {
  shareLinkListSchema,
  shareLinkSchema,
  type ShareLink,
  type ShareLinkChange,
  type ShareLinkFields,
} from '@/lib/schemas/share'

/** The share links of one analysis and what can be done with them. */
export function useShareLinks(projectId: string, analysisId: string) {
  const base = `/api/projects/${projectId}`
  const key = `${base}/analyses/${analysisId}/share-links`
  const { data, error, mutate } = useSWR<{ links: ShareLink[] }, Error>(key, (url: string) =>
    getJson(url, shareLinkListSchema),
  )
  return {
    links: data?.links,
    error,
    reload: () => void mutate(),
    make: async (fields: ShareLinkFields) => {
      const made = await sendJson('POST', key, fields, shareLinkSchema)
      await mutate()
      return made
    },
    change: async (linkId: string, change: ShareLinkChange) => {
      await sendJson('PATCH', `${base}/share-links/${linkId}`, change, shareLinkSchema)
      await mutate()
    },
    revoke: async (linkId: string) => {
      await sendOnly('DELETE', `${base}/share-links/${linkId}`)
      await mutate()
    },
  }
}

/** The address that is handed on. */
export function addressOf({ token }: ShareLink): string {
  return `${window.location.origin}/share/${token}`
}

export type LinkState = 'open' | 'expired' | 'revoked'

export function stateOf({ expiresAt, revokedAt }: ShareLink, now: Date): LinkState {
  if (revokedAt !== null) return 'revoked'
  return expiresAt !== null && new Date(expiresAt) <= now ? 'expired' : 'open'
}
