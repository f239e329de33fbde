import Link from 'next/link'
import { Notice } from '@/components/ui/notice'
import { counted, listed } from '@/lib/findings/words'
import type { Deletion } from '@/lib/schemas/accounts'

const quoted = ({ name }: { name: string }) => `“${name}”`

function contents({ runCount, analysisCount, correctionCount }: Deletion['lost'][number]): string {
  if (runCount + analysisCount + correctionCount === 0) return 'nothing recorded in it yet'
  return listed([
    counted(runCount, 'run'),
    counted(analysisCount, 'analysis', 'analyses'),
    counted(correctionCount, 'correction table'),
  ])
}

/** What deleting the account takes along, what stays, and what is in the way. */
export function DeletionPlan({ plan: { blocking, lost, left } }: { plan: Deletion }) {
  return (
    <div className="flex max-w-[70ch] flex-col gap-3 wrap-anywhere">
      {blocking.length > 0 ? (
        <Notice tone="warning" title="Somebody else must be owner first">
          <p>You are the only owner of projects in which others work. Make one of them an owner; then come back.</p>
          <ul className="mt-1 list-disc pl-5">
            {blocking.map((project) => (
              <li key={project.id}>
                <Link className="link" href={`/projects/${project.id}/people`}>
                  {project.name}
                </Link>
              </li>
            ))}
          </ul>
        </Notice>
      ) : null}
      {lost.length > 0 ? (
        <div>
          <p className="font-semibold">Deleted with everything in them, since nobody else is a member:</p>
          <ul className="mt-1 list-disc pl-5">
            {lost.map((project) => (
              <li key={project.id}>
                {project.name}: {contents(project)}
              </li>
            ))}
          </ul>
        </div>
      ) : null}
      {left.length > 0 ? (
        <p>
          {listed(left.map(quoted))} {left.length === 1 ? 'goes' : 'go'} on without you. What you made there stays,
          under the name “Former member”; the record of who did what keeps your name as it was written.
        </p>
      ) : null}
      <p>
        Your address, your password and your sessions are deleted, and invitations of yours that nobody has taken yet
        are revoked.{lost.length === 0 ? ' No project is lost.' : ''}
      </p>
    </div>
  )
}
