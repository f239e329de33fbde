'use client'

import type { ComponentProps } from 'react'
import { useSWRConfig } from 'swr'
import { ConfirmDialog } from '@/components/ui/confirm-dialog'
import { projectKey } from '@/lib/client/project-data'

/** Asks before something changes for a member; once it is closed the list is as the server has it by then. */
export function MemberDialog({
  projectId,
  onClose,
  ...rest
}: ComponentProps<typeof ConfirmDialog> & { projectId: string }) {
  const { mutate } = useSWRConfig()
  return (
    <ConfirmDialog
      {...rest}
      onClose={() => {
        onClose()
        void mutate(projectKey(projectId))
        void mutate(`${projectKey(projectId)}/members`)
      }}
    />
  )
}
