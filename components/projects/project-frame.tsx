'use client'

import type { ReactNode } from 'react'
import { ButtonLink } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { RequestError } from '@/lib/client/fetcher'
import { useProjectStanding } from '@/lib/client/project-data'

/** Says above every page of a project when it is archived, or not there any more; what is on the page stays readable. */
export function ProjectFrame({ projectId, children }: { projectId: string; children: ReactNode }) {
  const { data, error } = useProjectStanding(projectId)
  const isGone = error instanceof RequestError && error.status === 404
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
          {data.role === 'owner' ? '; you can open it again in its settings.' : ' until an owner opens it again.'}
        </Notice>
      ) : null}
      {children}
    </>
  )
}
