import { NextResponse, type NextRequest } from 'next/server'
import { SHARE_STATUS_HEADER, shareStatus } from '@/lib/server/share'

/**
 * Gives every page its Content-Security-Policy with a fresh nonce, on the request too, where Next.js and the root layout
 * read it.
 */
export async function proxy(request: NextRequest) {
  const nonce = Buffer.from(crypto.getRandomValues(new Uint8Array(16))).toString('base64')
  const policy = contentSecurityPolicy(nonce, process.env.NODE_ENV === 'development')

  const headers = new Headers(request.headers)
  headers.set('x-nonce', nonce)
  headers.set('Content-Security-Policy', policy)

  const response = await passOn(request, headers)
  response.headers.set('Content-Security-Policy', policy)
  return response
}

const SHARE_PAGE = /^\/share\/([^/]+)$/

/** As the page gets it: a letter of a token may be written as its number. */
function decoded(part: string): string {
  try {
    return decodeURIComponent(part)
  } catch {
    return part
  }
}

/**
 * On to the page. A page can't choose its status, so the page of a share link that has ended gets its 410 here; for the
 * others the page itself says that there is nothing. What the page reads in x-share-status was never sent by a browser.
 */
async function passOn(request: NextRequest, headers: Headers): Promise<NextResponse> {
  headers.delete(SHARE_STATUS_HEADER)
  const part = SHARE_PAGE.exec(request.nextUrl.pathname)?.[1]
  if (!part) return NextResponse.next({ request: { headers } })
  const status = await shareStatus(request, decoded(part))
  headers.set(SHARE_STATUS_HEADER, String(status))
  if (status === 200) return NextResponse.next({ request: { headers } })
  return NextResponse.rewrite(request.nextUrl, { status, request: { headers } })
}

function contentSecurityPolicy(nonce: string, isDevelopment: boolean): string {
  // Hot reload evaluates code and writes styles into the page; what is served to people does neither.
  const styles = isDevelopment ? "'unsafe-inline'" : `'nonce-${nonce}'`
  return [
    "default-src 'self'",
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${isDevelopment ? " 'unsafe-eval'" : ''}`,
    `style-src 'self' ${styles}`,
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    "connect-src 'self'",
    "worker-src 'self'",
    "object-src 'none'",
    "base-uri 'self'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ].join('; ')
}

export const config = {
  // Uploads stay outside: where the proxy matches, a handler gets only the first 10 MB of a body. The HTML part of a local
  // mail brings a policy of its own.
  matcher: [
    '/((?!api/projects/[^/]+/runs|api/projects/import|api/local-mail/[^/]+/html|_next/static|_next/image|icon.svg|favicon.ico|sample-run.csv).*)',
  ],
}
