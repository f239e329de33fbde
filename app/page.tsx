import { Suspense } from 'react'
import { LandingPicture } from '@/components/landing/landing-picture'
import { PageFrame } from '@/components/shell/page-frame'
import { ButtonLink } from '@/components/ui/button'
import { Card } from '@/components/ui/card'
import { currentUser } from '@/lib/server/current-user'

export default async function LandingPage() {
  const user = await currentUser()
  return (
    <PageFrame>
      <div className="grid items-end gap-y-4 pt-2 lg:grid-cols-[minmax(0,1.45fr)_minmax(0,1fr)]">
        <div className="max-w-[60rem] lg:pr-5">
          <h1 className="text-title font-[640] text-balance">
            Find out what your mount’s worm does to your pictures, and whether a correction would help
          </h1>
          <p className="mt-2 text-finding text-pretty text-soft">
            Bring the log of a star that was tracked for an hour. Turnwright tells drift from gears, says which part of
            the drive makes which swing and how sure that is, and makes a correction table that it has rehearsed first.
          </p>
        </div>
        <div className="lg:pl-5">
          <div className="flex flex-wrap gap-2">
            <ButtonLink href="/bench" variant="primary">
              Try the bench
            </ButtonLink>
            {user ? (
              <ButtonLink href="/projects">Your projects</ButtonLink>
            ) : (
              <ButtonLink href="/sign-in">Sign in</ButtonLink>
            )}
          </div>
          <p className="mt-2 text-sm text-pretty text-soft">
            No account needed. A file of your own stays in this browser until you sign in and save it.
          </p>
        </div>
      </div>
      <Suspense fallback={<Card className="min-h-[36rem]" aria-label="The sample run is being analysed" />}>
        <LandingPicture />
      </Suspense>
      <div className="grid gap-x-10 gap-y-5 md:grid-cols-3">
        {steps.map(({ title, text }) => (
          <section key={title}>
            <h2 className="text-finding font-semibold">{title}</h2>
            <p className="mt-1 text-soft">{text}</p>
          </section>
        ))}
      </div>
    </PageFrame>
  )
}

const steps = [
  {
    title: 'Record',
    text: 'Let the mount track a star for six turns of its worm, guiding off, and log where the star stands every few seconds. Text with a time and a position is enough.',
  },
  {
    title: 'Read',
    text: 'The bench takes the record apart from top to bottom: track, spectrum, harmonics, one turn, spans. Every figure has its unit and its standard error, and every stage says what it found in a sentence.',
  },
  {
    title: 'Decide',
    text: 'Leave it, guide it out, correct it, or look at the mount. A correction table is tried on turns it was not made from before you load it; record again and compare.',
  },
]
