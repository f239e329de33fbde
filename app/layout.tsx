import type { Metadata, Viewport } from 'next'
import { cookies, headers } from 'next/headers'
import type { ReactNode } from 'react'
import { Providers } from '@/components/shell/providers'
import { SiteHeader } from '@/components/shell/site-header'
import { DisplayProvider } from '@/lib/client/display'
import { isTheme, themeCookieName } from '@/lib/client/theme-names'
import { DEFAULT_PREFERENCES } from '@/lib/schemas/preferences'
import { currentUser } from '@/lib/server/current-user'
import './globals.css'

export const metadata: Metadata = {
  title: { default: 'Turnwright', template: '%s · Turnwright' },
  description: 'A web workbench for the periodic error of telescope mounts.',
  icons: { icon: '/icon.svg' },
}

export const viewport: Viewport = { width: 'device-width', initialScale: 1 }

/** Plotly writes its styles into elements with these ids when it finds them; without the nonce the policy would drop them. */
const plotlyStyleIds = ['plotly.js-style-global', 'ce8d464691048653ffe3a57c6c18ab566e8366f186677868cf724621a857b4fe']

export default async function RootLayout({ children }: { children: ReactNode }) {
  const nonce = (await headers()).get('x-nonce') ?? undefined
  const chosen = (await cookies()).get(themeCookieName)?.value
  const theme = isTheme(chosen) ? chosen : undefined
  const user = await currentUser()
  return (
    <html lang="en" data-theme={theme} suppressHydrationWarning>
      <head>
        {plotlyStyleIds.map((id) => (
          <style key={id} id={id} nonce={nonce} suppressHydrationWarning />
        ))}
      </head>
      <body>
        <a
          href="#main"
          className="sr-only focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-10 focus:rounded-control focus:bg-ink focus:px-3 focus:py-2 focus:text-sheet"
        >
          Skip to the page
        </a>
        <Providers>
          <DisplayProvider preferences={user?.preferences ?? DEFAULT_PREFERENCES}>
            <SiteHeader user={user} serverTheme={theme} />
            <main id="main" tabIndex={-1} className="outline-none">
              {children}
            </main>
          </DisplayProvider>
        </Providers>
      </body>
    </html>
  )
}
