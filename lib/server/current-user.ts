import 'server-only'
import { cookies } from 'next/headers'
import { notFound, redirect } from 'next/navigation'
import { cache } from 'react'
import { z } from 'zod'
import { database } from '@/db'
import { accessProject, type ProjectAccess } from '@/db/queries/access'
import { Refusal } from '@/db/queries/refusal'
import { SESSION_COOKIE, validateToken, type SignedInUser } from './auth'

/** Who looks at the page, or null; asked of the database once per request. */
export const currentUser = cache(async (): Promise<SignedInUser | null> => {
  return validateToken((await cookies()).get(SESSION_COOKIE)?.value)
})

/** The person looking, or on to the sign-in page, which leads back to `returnTo`. */
export async function requirePageUser(returnTo: string): Promise<SignedInUser> {
  const user = await currentUser()
  if (!user) redirect(`/sign-in?next=${encodeURIComponent(returnTo)}`)
  return user
}

export interface ProjectPage {
  user: SignedInUser
  access: ProjectAccess<'read'>
}

/** For every page below a project: sign-in for visitors, "not found" for strangers. */
export async function requireProjectPage(projectId: string, returnTo = `/projects/${projectId}`): Promise<ProjectPage> {
  const user = await requirePageUser(returnTo)
  assertAddressId(projectId)
  const access = await orNotFound(accessProject(database(), { userId: user.id, projectId, right: 'read' }))
  return { user, access }
}

/** The "not found" page for an address whose part can name nothing; PostgreSQL would take it for a fault. */
export function assertAddressId(id: string): void {
  if (!z.uuid().safeParse(id).success) notFound()
}

/** What a query gives, or the "not found" page where it refuses because there is no such thing. */
export async function orNotFound<T>(pending: Promise<T>): Promise<T> {
  try {
    return await pending
  } catch (error) {
    if (error instanceof Refusal && error.reason.kind === 'unknown') notFound()
    throw error
  }
}
