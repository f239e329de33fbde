import 'server-only'
import { AppError } from './errors'
import { environment } from './environment'

function isOwnOrigin(request: Request): boolean {
  const origin = request.headers.get('origin')
  if (!origin || !URL.canParse(origin)) return false
  const { baseOrigin, isProxyTrusted } = environment()
  if (baseOrigin) return origin === baseOrigin
  const forwarded = isProxyTrusted ? request.headers.get('x-forwarded-host') : null
  return new URL(origin).host === (forwarded ?? request.headers.get('host'))
}

/**
 * Refuses what another site's page sends with our cookie. Browsers name the origin with every request that is not a plain
 * read, so a request without one is refused as well.
 */
export function assertOwnOrigin(request: Request): void {
  if (!isOwnOrigin(request)) throw new AppError('wrong-origin', 'This request does not come from a page of this site')
}
