'use client'

import { useEffect, type ReactNode } from 'react'
import { ButtonLink } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { onRefused, RequestError } from '@/lib/client/fetcher'
import { projectKey, useProject } from '@/lib/client/project-data'
import { canManageProject } from '@/lib/schemas/rights'

/** Says above every page of a project when it is archived, or not there any more; what is on the page stays readable. */
export function ProjectFrame({ projectId, children }: { projectId: string; children: ReactNode }) {
  const { data, error, mutate } = useProject(projectId)
  const isGone = error instanceof RequestError && error.status === 404

  // Whoever was removed, or lost a right, meets it at the next request of any part of the page.
  useEffect(() => {
    return onRefused(({ url, status }) => {
      const path = URL.canParse(url) ? new URL(url).pathname : url
      if (path.startsWith(`${projectKey(projectId)}/`) && (status === 403 || status === 404)) void mutate()
    })
  }, [projectId, mutate])

  return (
    <>
      {isGone ? (
        <Notice
          tone="error"
          title="This project is not there any more"
          isLive
          actions={<ButtonLink href="/projects">To your projects</ButtonLink>}
        >
          It was deleted, or you are no longer one of its people. Nothing more can be saved in it; copy what you typed
          if you want to keep it.
        </Notice>
      ) : data?.archivedAt ? (
        <Notice title="This project is archived">
          Everything can be read and downloaded, and its share links still open. Nothing in it can be changed
          {canManageProject(data) ? '; you can open it again in its settings.' : ' until an owner opens it again.'}
        </Notice>
      ) : null}
      {children}
    </>
  )
}
