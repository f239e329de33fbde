import type { Metadata } from 'next'
import { PageFrame } from '@/components/shell/page-frame'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'

export const metadata: Metadata = { title: 'Not found' }

export default function NotFound() {
  return (
    <PageFrame>
      <PageHeading
        title="There is nothing at this address"
        lead="It may have been removed, or it belongs to a project that you are not a member of. Ask its owner if you expected to see it."
      />
      <div className="flex flex-wrap gap-2">
        <ButtonLink href="/projects" variant="primary">
          Your projects
        </ButtonLink>
        <ButtonLink href="/bench">Open the bench</ButtonLink>
      </div>
    </PageFrame>
  )
}
