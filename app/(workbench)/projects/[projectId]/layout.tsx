import type { Metadata } from 'next'
import { ProjectFrame } from '@/components/projects/project-frame'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { currentUser, requireProjectPage } from '@/lib/server/current-user'
import { loadProject } from '@/lib/server/load-projects'

export async function generateMetadata({ params }: LayoutProps<'/projects/[projectId]'>): Promise<Metadata> {
  if (!(await currentUser())) return {}
  const { access } = await requireProjectPage((await params).projectId)
  const { name } = await loadProject(access)
  return { title: { default: name, template: `%s · ${name} · Turnwright` } }
}

/** Hands the project to everything below it. Each page checks for itself who asks: a layout is not run on every move. */
export default async function ProjectLayout({ children, params }: LayoutProps<'/projects/[projectId]'>) {
  // The page below knows its own address, so it is the one that leads through sign-in and back.
  if (!(await currentUser())) return children
  const { access } = await requireProjectPage((await params).projectId)
  const project = await loadProject(access)
  return (
    <SwrFallback fallback={{ [`/api/projects/${project.id}`]: project }}>
      <ProjectFrame projectId={project.id}>{children}</ProjectFrame>
    </SwrFallback>
  )
}
