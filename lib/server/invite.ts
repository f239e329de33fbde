import 'server-only'
import type { ProjectAccess } from '@/db/queries/access'
import { accountLimit, addressLimit, takeAttempt } from './rate-limit'

/** Every invitation is a mail to somebody who did not ask for it, so few go out at once: by person, place and project. */
export async function takeInvitationAttempt(request: Request, access: ProjectAccess): Promise<void> {
  await takeAttempt(accountLimit('invite account', access.userId))
  await takeAttempt(addressLimit('invite address', request))
  await takeAttempt(accountLimit('invite project', access.projectId))
}
