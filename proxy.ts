import { NextResponse, type NextRequest } from 'next/server'

/**
 * Gives every page its Content-Security-Policy with a fresh nonce, on the request too, where Next.js and the root layout
 * read it.
 */
export function proxy(request: NextRequest) {
  const nonce = Buffer.from(crypto.getRandomValues(new Uint8Array(16))).toString('base64')
  const policy = contentSecurityPolicy(nonce, process.env.NODE_ENV === 'development')

  const headers = new Headers(request.headers)
  headers.set('x-nonce', nonce)
  headers.set('Content-Security-Policy', policy)

  const response = NextResponse.next({ request: { headers } })
  response.headers.set('Content-Security-Policy', policy)
  return response
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
