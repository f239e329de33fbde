import Link from 'next/link'
import { ButtonAnchor } from '@/components/ui/button'

/** The whole project as files, for anyone who may read it. */
export function DownloadSection({ projectId }: { projectId: string }) {
  return (
    <div className="flex max-w-[65ch] flex-col gap-3">
      <p>
        A ZIP with the original recordings byte for byte, all settings, figures, notes and correction tables, and the
        log of who did what, as CSV and JSON with a schema for each. No e-mail addresses are in it.
      </p>
      <div>
        <ButtonAnchor href={`/api/projects/${projectId}/archive`} download>
          Download everything
        </ButtonAnchor>
      </div>
      <p className="text-sm text-soft">
        <Link className="link" href="/projects/import">
          Bring in an archive
        </Link>{' '}
        makes a new project of such a file, here or on another server, up to 1 GB.
      </p>
    </div>
  )
}
