'use client'

import { useEffect, type ReactNode } from 'react'
import { ButtonAnchor } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { onRefused, RequestError } from '@/lib/client/fetcher'
import { projectKey, useProject } from '@/lib/client/project-data'

/**
 * Says so once the person was removed, or the project deleted, while a page was open; the page stays, since something that
 * was typed may stand on it. A refusal for want of a right shows that the role changed, so the project is asked for again.
 */
export function ProjectGate({ projectId, children }: { projectId: string; children: ReactNode }) {
  const { error, mutate } = useProject(projectId)
  const isGone = error instanceof RequestError && error.status === 404

  useEffect(() => {
    const key = projectKey(projectId)
    return onRefused(({ url, status }) => {
      const path = URL.canParse(url) ? new URL(url).pathname : url
      if (path.startsWith(`${key}/`) && (status === 403 || status === 404)) void mutate()
    })
  }, [projectId, mutate])

  return (
    <>
      {isGone ? (
        <Notice
          tone="error"
          title="You can no longer open this project"
          isLive
          actions={<ButtonAnchor href="/projects">To your projects</ButtonAnchor>}
        >
          An owner removed you, or the project was deleted. What this page shows was read before that; nothing on it can
          be saved any more. Copy what you still need, and ask an owner if this is a mistake.
        </Notice>
      ) : null}
      {children}
    </>
  )
}
