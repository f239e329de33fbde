import { ButtonLink } from '@/components/ui/button'
import { PageFrame } from '@/components/shell/page-frame'
import { currentUser } from '@/lib/server/current-user'

export default async function LandingPage() {
  const user = await currentUser()
  return (
    <PageFrame>
      <div className="max-w-[46rem] pt-4">
        <h1 className="text-title font-[640] text-balance">
          Find out what your mount’s worm does to your pictures, and whether a correction would help
        </h1>
        <p className="mt-3 text-finding text-soft">
          Drop the log of a star that was tracked for half an hour. Turnwright separates drift from gears, tells which
          part of the drive makes which swing and how sure that is, and makes a correction table that it has rehearsed
          first.
        </p>
        <div className="mt-5 flex flex-wrap gap-2">
          <ButtonLink href="/bench" variant="primary">
            Try the bench
          </ButtonLink>
          {user ? (
            <ButtonLink href="/projects">Your projects</ButtonLink>
          ) : (
            <ButtonLink href="/sign-in">Sign in</ButtonLink>
          )}
        </div>
        <p className="mt-2 text-sm text-soft">
          The bench works without an account, with the sample run or a file of your own. The file stays in your browser
          until you sign in and save it.
        </p>
      </div>
    </PageFrame>
  )
}
