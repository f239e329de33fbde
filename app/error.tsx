'use client'

import { PageFrame } from '@/components/shell/page-frame'
import { PageHeading } from '@/components/shell/page-heading'
import { Button, ButtonLink } from '@/components/ui/button'

export default function ErrorPage({ error, retry }: { error: unknown; retry: () => void }) {
  const digest = error instanceof Error && 'digest' in error ? String(error.digest) : null
  return (
    <PageFrame>
      <PageHeading
        title="This page could not be made"
        lead="Nothing that was saved is lost. Try again; if it happens a second time, tell whoever runs this server."
      />
      {digest ? (
        <p className="text-sm text-soft">
          Their log knows it as <span className="figures">{digest}</span>.
        </p>
      ) : null}
      <div className="flex flex-wrap gap-2">
        <Button variant="primary" onClick={retry}>
          Try again
        </Button>
        <ButtonLink href="/">To the first page</ButtonLink>
      </div>
    </PageFrame>
  )
}
