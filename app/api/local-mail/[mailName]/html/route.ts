import { localMailFolder, readLocalMail } from '@/lib/server/local-mail'
import { AppError } from '@/lib/server/errors'
import { respond } from '@/lib/server/respond'

/** What a mail may do inside our page: show its own styles, and lead on when a link in it is clicked. */
const POLICY = [
  "default-src 'none'",
  "style-src 'unsafe-inline'",
  'sandbox allow-top-navigation-by-user-activation',
  "frame-ancestors 'self'",
].join('; ')

export function GET(request: Request, context: RouteContext<'/api/local-mail/[mailName]/html'>) {
  return respond(async () => {
    const { mailName } = await context.params
    const { html } = await readLocalMail(localMailFolder(request), mailName)
    if (html === null) throw new AppError('not-found', 'This mail has no HTML part')
    const headers = {
      'content-type': 'text/html; charset=utf-8',
      'content-security-policy': POLICY,
      'cache-control': 'no-store',
    }
    // Links leave the frame, whose sandbox no page of ours would work in.
    return new Response(html.replace(/<head>/i, '<head><base target="_top">'), { headers })
  })
}
