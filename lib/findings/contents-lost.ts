import type { ProjectContents } from '@/lib/schemas/api'
import { formatBytes } from '@/lib/units'
import { capitalised, counted } from './words'

/** What is lost with a project, a line for each kind of which there is something. */
export function contentsLost(contents: ProjectContents): string[] {
  const { runCount, runBytes, analysisCount, noteCount, correctionCount } = contents
  const { memberCount, shareLinkCount, invitationCount } = contents
  const others = memberCount - 1
  const lines = [
    runCount > 0 ? `${counted(runCount, 'run')} with their files, ${formatBytes(runBytes)}` : null,
    analysisCount > 0 ? counted(analysisCount, 'analysis', 'analyses') : null,
    noteCount > 0 ? counted(noteCount, 'note') : null,
    correctionCount > 0 ? counted(correctionCount, 'correction table') : null,
    shareLinkCount > 0 ? `${counted(shareLinkCount, 'share link')}, which will open nothing any more` : null,
    invitationCount > 0 ? `${counted(invitationCount, 'invitation')} that nobody has taken up yet` : null,
    others > 0 ? `the access of ${counted(others, 'other person', 'other people')}` : null,
  ].filter((line) => line !== null)
  return lines.length > 0 ? lines.map(capitalised) : ['Its drive train and its settings; there is nothing else in it']
}
