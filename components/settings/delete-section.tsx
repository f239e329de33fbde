'use client'

import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { useSWRConfig } from 'swr'
import { Button, ButtonAnchor } from '@/components/ui/button'
import { ConfirmByName } from '@/components/ui/confirm-by-name'
import { DataState } from '@/components/ui/data-state'
import { sendOnly } from '@/lib/client/fetcher'
import { isProjectsKey, useProjectContents } from '@/lib/client/project-data'
import { contentsLost } from '@/lib/findings/contents-lost'
import type { Project } from '@/lib/schemas/api'
import { canManageProject } from '@/lib/schemas/rights'

/** Deletes the project for good, after its owner has seen what goes and typed its name. */
export function DeleteSection({ project }: { project: Project }) {
  const router = useRouter()
  const { mutate } = useSWRConfig()
  const [isAsking, setAsking] = useState(false)
  const contents = useProjectContents(project.id, isAsking)
  const url = `/api/projects/${project.id}`

  if (!canManageProject(project)) return <p className="text-soft">Only an owner deletes a project.</p>

  return (
    <div className="flex max-w-[65ch] flex-col gap-3">
      <p>
        All that is in it is deleted for good, for everybody.
        {project.archivedAt ? null : ' To put it away and keep it, archive it instead.'}
      </p>
      <div>
        <Button variant="danger" onClick={() => setAsking(true)}>
          Delete this project
        </Button>
      </div>
      <ConfirmByName
        isOpen={isAsking}
        onClose={() => setAsking(false)}
        title="Delete this project for good?"
        name={project.name}
        confirmLabel="Delete it"
        onConfirm={async () => {
          await sendOnly('DELETE', url, { name: project.name })
          await mutate(isProjectsKey)
          router.push('/projects')
        }}
      >
        <DataState
          what="what would be lost"
          data={contents.data}
          error={contents.error}
          onRetry={() => void contents.mutate()}
        >
          {(counts) => (
            <>
              <p>With it go:</p>
              <ul className="my-2 list-disc pl-5">
                {contentsLost(counts).map((line) => (
                  <li key={line}>{line}</li>
                ))}
              </ul>
            </>
          )}
        </DataState>
        <p className="mb-3">Nobody can bring it back from here. Download it first if anybody may want it later.</p>
        <ButtonAnchor href={`${url}/archive`} download>
          Download everything
        </ButtonAnchor>
      </ConfirmByName>
    </div>
  )
}
