'use client'

import Link from 'next/link'
import type { z } from 'zod'
import { FindingText } from '@/components/findings/finding-text'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { EmptyState } from '@/components/ui/empty-state'
import { FigureStrip } from '@/components/ui/figure-strip'
import { FactRow, SheetSection } from '@/components/ui/sheet-section'
import { useDates, useDisplay } from '@/lib/client/display'
import { useAnalysis, useHistory, useLatestRuns, useMembers, useProject } from '@/lib/client/project-data'
import { shownSwing } from '@/lib/display-units'
import { findingText } from '@/lib/findings/finding'
import { runsFinding } from '@/lib/findings/list-findings'
import { historyFinding, overviewFinding } from '@/lib/findings/overview-finding'
import { amplitudeOf, peakToPeakOf, type HistoryPoint } from '@/lib/findings/project-history'
import { counted } from '@/lib/findings/words'
import type { Project } from '@/lib/schemas/api'
import { overviewFiguresSchema } from '@/lib/schemas/kept-figures'
import type { Estimate } from '@/lib/analysis/types'
import { canEditProject } from '@/lib/schemas/rights'
import type { historySchema, runListSchema } from '@/lib/schemas/lists'
import { estimateParts } from '@/lib/units'
import { HistoryPicture } from './history-picture'
import { overviewKeyFigures } from './overview-figures'
import { wormPeriodText } from './teeth'

export function OverviewScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const latestRuns = useLatestRuns(projectId)
  const history = useHistory(projectId)
  const data =
    project.data && latestRuns.data && history.data
      ? { project: project.data, latestRuns: latestRuns.data, history: history.data }
      : undefined
  return (
    <DataState
      what="the project"
      data={data}
      error={project.error ?? latestRuns.error ?? history.error}
      onRetry={() => void Promise.all([project.mutate(), latestRuns.mutate(), history.mutate()])}
    >
      {(all) => <Overview {...all} />}
    </DataState>
  )
}

interface OverviewProps {
  project: Project
  latestRuns: z.output<typeof runListSchema>
  history: z.output<typeof historySchema>
}

function Overview({ project, latestRuns, history: { points: history, total } }: OverviewProps) {
  const base = `/projects/${project.id}`
  const last = history.at(-1)
  const kept = useAnalysis(project.id, last?.analysisId ?? null)
  const figures = overviewFiguresSchema.safeParse(kept.data?.result)
  const latest = figures.success ? figures.data : null
  const display = useDisplay(kept.data?.recipe.conversion ?? null)
  const { day } = useDates()
  const canEdit = canEditProject(project)
  const title = overviewFinding({
    name: project.name,
    runCount: latestRuns.all,
    analysisCount: project.analysisCount,
    history,
    latest,
    display,
  })
  const upload = (
    <ButtonLink href={`${base}/runs/new`} variant="primary">
      Bring in a run
    </ButtonLink>
  )

  return (
    <>
      <PageHeading
        crumbs={[{ label: 'Projects', href: '/projects' }, { label: project.name }]}
        title={findingText(title)}
        actions={canEdit && latestRuns.all > 0 ? upload : null}
      />
      {latest?.worm && last ? (
        <FigureStrip figures={overviewKeyFigures(latest, display)} label="Figures of the latest run" />
      ) : null}
      {latestRuns.all === 0 ? (
        <EmptyState title="Bring in a first recording" actions={canEdit ? upload : null}>
          Record a star for six turns of the worm or more, {durationHint(project)}, with guiding off and no correction
          playing. The log of your guiding or imaging program will do, as long as it is text with a time and a position.
        </EmptyState>
      ) : (
        <SheetSection
          title="History"
          question="How has the worm behaved from run to run? The newest analysis of each run counts."
          finding={<FindingText finding={historyFinding(history, total)} />}
          aside={<HistoryTable projectId={project.id} history={history} />}
        >
          {history.length > 0 ? (
            <HistoryPicture
              projectId={project.id}
              history={history}
              summary={findingText(historyFinding(history, total))}
            />
          ) : (
            <ButtonLink href={`${base}/runs`}>To the runs</ButtonLink>
          )}
        </SheetSection>
      )}
      {latestRuns.all > 0 ? (
        <SheetSection
          title="Runs"
          question="The latest recordings."
          finding={<FindingText finding={runsFinding(latestRuns)} />}
          aside={<ProjectFacts project={project} />}
        >
          <ul>
            {latestRuns.runs.map((run) => (
              <li
                key={run.id}
                className="flex flex-wrap justify-between gap-x-4 border-b border-rule py-2 last:border-b-0"
              >
                <Link className="link font-semibold pointer-coarse:py-2.5" href={`${base}/runs/${run.id}`}>
                  {run.name}
                </Link>
                <span className="text-sm text-soft">
                  {run.startedAt ? `recorded ${day(run.startedAt)}` : `brought in ${day(run.createdAt)}`}
                  {', '}
                  {counted(run.analysisCount, 'analysis', 'analyses')}
                </span>
              </li>
            ))}
          </ul>
        </SheetSection>
      ) : null}
    </>
  )
}

function durationHint({ driveTrain: { wheelTeeth, wormStarts } }: Project): string {
  return wheelTeeth === null
    ? 'most often an hour'
    : `six times ${wormPeriodText(wheelTeeth, wormStarts)} for this mount`
}

function HistoryTable({ projectId, history }: { projectId: string; history: readonly HistoryPoint[] }) {
  const display = useDisplay()
  const { day } = useDates()
  const isAmplitude = display.swingMeasure === 'amplitude'
  if (history.length === 0)
    return <p className="text-sm text-soft">The figures of each analysed run will stand here.</p>
  return (
    <table className="w-full text-sm">
      <caption className="pb-1 text-left font-semibold text-soft">Worm, run by run</caption>
      <thead>
        <tr className="border-b border-rule text-soft">
          <th scope="col" className="py-1.5 text-left font-medium">
            recorded
          </th>
          <th scope="col" className="py-1.5 pl-2 text-right font-medium">
            {isAmplitude ? 'ampl. ″' : 'fund. p–p ″'}
          </th>
          <th scope="col" className="py-1.5 pl-2 text-right font-medium">
            {isAmplitude ? 'p–p ″' : 'all p–p ″'}
          </th>
        </tr>
      </thead>
      <tbody>
        {[...history]
          .reverse()
          .slice(0, 8)
          .map((point) => (
            <tr key={point.analysisId} className="border-b border-rule">
              <th scope="row" className="py-1.5 text-left font-normal whitespace-nowrap">
                <Link
                  href={`/projects/${projectId}/analyses/${point.analysisId}`}
                  className="hover:underline pointer-coarse:inline-block pointer-coarse:py-3"
                >
                  {day(point.at)}
                </Link>
              </th>
              <td className="figures py-1.5 pl-2 text-right">
                <Stacked estimate={shownSwing(amplitudeOf(point), display)} />
              </td>
              <td className="figures py-1.5 pl-2 text-right">
                <Stacked estimate={peakToPeakOf(point)} />
              </td>
            </tr>
          ))}
      </tbody>
    </table>
  )
}

/** A value with its error below it: side by side they are too wide for this column. */
function Stacked({ estimate }: { estimate: Estimate }) {
  const { value, error } = estimateParts(estimate)
  return (
    <>
      {value}
      {error === null ? null : <span className="block text-xs whitespace-nowrap text-soft">± {error}</span>}
    </>
  )
}

const PEOPLE_SHOWN = 8

function ProjectFacts({ project }: { project: Project }) {
  const { data } = useMembers(project.id)
  const { wheelTeeth, wormStarts, stages } = project.driveTrain
  const base = `/projects/${project.id}`
  const moreCount = (data?.members.length ?? 0) - PEOPLE_SHOWN
  return (
    <>
      <h3 className="text-sm font-semibold text-soft">This mount</h3>
      <dl>
        <FactRow name="wheel">{wheelTeeth === null ? 'unknown' : `${wheelTeeth} teeth`}</FactRow>
        <FactRow name="worm period, by the teeth">{wormPeriodText(wheelTeeth, wormStarts)}</FactRow>
        <FactRow name="stages before the worm">{stages.length}</FactRow>
      </dl>
      <p className="mt-2 text-sm">
        <Link className="link" href={`${base}/drive`}>
          All parts and periods
        </Link>
      </p>
      <h3 className="mt-4 text-sm font-semibold text-soft">People</h3>
      <dl>
        {data?.members.slice(0, PEOPLE_SHOWN).map(({ userId, displayName, role }) => (
          <FactRow key={userId} name={displayName}>
            <span className="font-sans">{role}</span>
          </FactRow>
        ))}
      </dl>
      {moreCount > 0 ? (
        <p className="mt-2 text-sm">
          <Link className="link" href={`${base}/people`}>
            {`And ${counted(moreCount, 'more person', 'more people')}`}
          </Link>
        </p>
      ) : null}
    </>
  )
}
