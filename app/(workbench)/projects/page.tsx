import type { Metadata } from 'next'
import { ProjectsScreen } from '@/components/lists/projects-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { requirePageUser } from '@/lib/server/current-user'
import { loadProjects } from '@/lib/server/load-projects'

export const metadata: Metadata = { title: 'Projects' }

export default async function ProjectsPage() {
  const user = await requirePageUser('/projects')
  const projects = await loadProjects(user.id)
  return (
    <SwrFallback fallback={{ '/api/projects': { projects } }}>
      <ProjectsScreen />
    </SwrFallback>
  )
}
