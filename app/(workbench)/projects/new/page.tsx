import type { Metadata } from 'next'
import Link from 'next/link'
import { NewProjectForm } from '@/components/projects/new-project-form'
import { PageHeading } from '@/components/shell/page-heading'
import { Card } from '@/components/ui/card'
import { requirePageUser } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'New project' }

export default async function NewProjectPage() {
  await requirePageUser('/projects/new')
  return (
    <>
      <PageHeading crumbs={[{ label: 'Projects', href: '/projects' }, { label: 'New' }]} title="Which mount is it?" />
      <p className="max-w-xl text-soft">
        Was it kept elsewhere before?{' '}
        <Link className="link" href="/projects/import">
          Bring in its archive
        </Link>{' '}
        instead.
      </p>
      <Card className="max-w-xl p-6 max-sm:p-4">
        <NewProjectForm />
      </Card>
    </>
  )
}
