'use client'

import { PageHeading } from '@/components/shell/page-heading'
import { TitledCard } from '@/components/ui/card'
import { DataState } from '@/components/ui/data-state'
import { Notice } from '@/components/ui/notice'
import { useMembers, useProject, type Member } from '@/lib/client/project-data'
import { useInvitations } from '@/lib/client/people-data'
import { capitalised, counted } from '@/lib/findings/words'
import { aRole, canManageProject, mayDo } from '@/lib/schemas/rights'
import { InvitationsTable } from './invitations-table'
import { InviteForm } from './invite-form'
import { MembersTable } from './members-table'

interface PeopleScreenProps {
  projectId: string
  /** Who looks. */
  userId: string
}

export function PeopleScreen({ projectId, userId }: PeopleScreenProps) {
  const project = useProject(projectId)
  const { data, error, mutate } = useMembers(projectId)
  const canManage = project.data !== undefined && canManageProject(project.data)
  const invitations = useInvitations(projectId, canManage)
  const name = project.data?.name ?? 'Project'
  return (
    <DataState what="the people" data={data} error={error} onRetry={() => void mutate()}>
      {({ members }) => (
        <>
          <PageHeading
            crumbs={[{ label: name, href: `/projects/${projectId}` }, { label: 'People' }]}
            title={titleOf(members, invitations.data?.invitations.length ?? 0)}
            lead={project.data ? `You are ${aRole(project.data.role)} and may ${mayDo(project.data.role)}.` : undefined}
          />
          <MembersTable project={{ id: projectId, name }} userId={userId} canManage={canManage} members={members} />
          {canManage ? (
            <>
              <DataState
                what="the invitations"
                data={invitations.data}
                error={invitations.error}
                onRetry={() => void invitations.mutate()}
              >
                {(list) =>
                  list.invitations.length > 0 ? (
                    <InvitationsTable
                      projectId={projectId}
                      invitations={list.invitations}
                      isArchived={project.data?.archivedAt != null}
                    />
                  ) : null
                }
              </DataState>
              <TitledCard title="Invite somebody" className="max-w-3xl">
                {project.data?.archivedAt ? (
                  <Notice>
                    This project is archived, so nobody can join. Open it again in its settings to invite people, or to
                    send an invitation again.
                  </Notice>
                ) : (
                  <InviteForm projectId={projectId} />
                )}
              </TitledCard>
            </>
          ) : null}
        </>
      )}
    </DataState>
  )
}

function titleOf(members: readonly Member[], invitedCount: number): string {
  const here =
    members.length === 1
      ? 'Only you work on this mount'
      : `${capitalised(counted(members.length, 'person', 'people'))} share this mount`
  if (invitedCount === 0) return here
  return `${here}, and ${counted(invitedCount, 'invitation')} ${invitedCount === 1 ? 'waits' : 'wait'} for an answer`
}
