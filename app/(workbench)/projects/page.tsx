import type { Metadata } from 'next'
import { ProjectsScreen } from '@/components/lists/projects-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { lenientQuery, listSearch, projectQuerySchema } from '@/lib/schemas/lists'
import { requirePageUser } from '@/lib/server/current-user'
import { firstView } from '@/lib/server/first-view'
import { loadProjects } from '@/lib/server/load-projects'

export const metadata: Metadata = { title: 'Projects' }

export default async function ProjectsPage({ searchParams }: PageProps<'/projects'>) {
  const user = await requirePageUser('/projects')
  const query = lenientQuery(projectQuerySchema, await searchParams)
  const projects = await firstView(loadProjects(user.id, query))
  return (
    <SwrFallback fallback={{ [`/api/projects${listSearch(projectQuerySchema, query)}`]: projects }}>
      <ProjectsScreen />
    </SwrFallback>
  )
}
