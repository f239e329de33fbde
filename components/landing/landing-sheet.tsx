import type { LandingPicture } from '@/lib/figures/landing-picture'
import { withSpace } from '@/lib/units'
import { LandingDialDrawing } from './landing-dial'
import { LandingStemsDrawing } from './landing-stems'
import { LandingTrackDrawing } from './landing-track'

/** Track, spectrum and turn of one run on one sheet; the sentences above the drawings are their text alternative. */
export function LandingSheet({ picture }: { picture: LandingPicture }) {
  const { track, stems, narrowTrack, narrowStems, dial, findings, figures } = picture
  return (
    <figure className="overflow-hidden rounded-card border border-rule bg-card">
      <div className={dial ? 'grid lg:grid-cols-[minmax(0,1.45fr)_minmax(0,1fr)]' : undefined}>
        <div className="min-w-0 border-rule p-5 max-sm:px-3 lg:border-r">
          <p className="mb-3 text-finding font-semibold text-pretty">{findings.track}</p>
          <LandingTrackDrawing track={track} className="max-sm:hidden" />
          <LandingTrackDrawing track={narrowTrack} className="sm:hidden" />
          <ul className="mt-1 flex flex-wrap gap-x-5 gap-y-1 text-sm text-soft">
            <LegendItem name="recorded" className="stroke-steel" width={1.2} />
            <LegendItem name="fitted" className="stroke-brass" width={2.4} />
            <LegendItem name="drift" className="stroke-verdigris" width={1.6} dashes="6 4" />
            <li className="flex items-center gap-2">
              <svg viewBox="0 0 10 10" className="size-2.5" aria-hidden="true" focusable="false">
                <path d="M1 1l8 8m0 -8l-8 8" fill="none" strokeWidth="1.6" className="stroke-oxide" />
              </svg>
              left out
            </li>
          </ul>
        </div>
        {dial ? (
          <div className="flex min-w-0 flex-col p-5 max-lg:order-last max-lg:border-t max-lg:border-rule max-sm:px-3 lg:row-span-2">
            <p className="mb-3 text-finding font-semibold text-pretty">{findings.dial}</p>
            <LandingDialDrawing dial={dial} />
            <p className="mt-3 text-sm text-soft">
              Every turn laid over the others, once round the worm. Outward the axis is ahead, inward behind; the dotted
              circle is zero. Figures in arc seconds.
            </p>
            <dl className="mt-auto pt-4">
              {figures.map(({ label, value, uncertainty, unit }) => (
                <div key={label} className="flex items-baseline justify-between gap-3 border-t border-rule py-1.5">
                  <dt className="text-sm text-soft">{label}</dt>
                  <dd className="text-right">
                    <span className="figures font-semibold">{value}</span>
                    <span className="figures text-sm text-soft">
                      {uncertainty === undefined ? null : ` ±\u202f${uncertainty}`}
                      {unit === undefined ? null : withSpace(unit)}
                    </span>
                  </dd>
                </div>
              ))}
            </dl>
          </div>
        ) : null}
        <div className="min-w-0 border-t border-rule p-5 max-sm:px-3 lg:border-r">
          <p className="mb-3 text-finding font-semibold text-pretty">{findings.stems}</p>
          <LandingStemsDrawing stems={stems} className="max-sm:hidden" />
          <LandingStemsDrawing stems={narrowStems} className="sm:hidden" />
        </div>
      </div>
      <figcaption className="border-t border-rule px-5 py-3 text-sm text-soft max-sm:px-3">
        Drawn from the sample run: an invented mount of our own, recorded by our simulator and read by the same analysis
        that the bench runs in your browser.
      </figcaption>
    </figure>
  )
}

interface LegendItemProps {
  name: string
  className: string
  width: number
  dashes?: string
}

function LegendItem({ name, className, width, dashes }: LegendItemProps) {
  return (
    <li className="flex items-center gap-2">
      <svg viewBox="0 0 26 6" className="h-1.5 w-6.5" aria-hidden="true" focusable="false">
        <line x1="0" x2="26" y1="3" y2="3" strokeWidth={width} strokeDasharray={dashes} className={className} />
      </svg>
      {name}
    </li>
  )
}
