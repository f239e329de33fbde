import { expect, test } from '@playwright/test'

const PAGES = ['/', '/bench', '/sign-in', '/no-such-page']

for (const path of PAGES) {
  test(`the policy of ${path} allows its own scripts and styles alone`, async ({ request }) => {
    const [first, second] = [await request.get(path), await request.get(path)]
    const policy = first.headers()['content-security-policy']
    const nonce = /'nonce-([^']+)'/.exec(policy)?.[1] ?? ''
    expect(Buffer.from(nonce, 'base64')).toHaveLength(16)
    expect(second.headers()['content-security-policy']).not.toContain(nonce)
    expect(policy).toContain(`script-src 'self' 'nonce-${nonce}' 'strict-dynamic';`)
    expect(policy).toContain(`style-src 'self' 'nonce-${nonce}';`)
    expect(policy).toContain("frame-ancestors 'none'")
    const html = await first.text()
    for (const [tag] of html.matchAll(/<script\b[^>]*>/g)) expect(tag).toContain(`nonce="${nonce}"`)
    expect(html).not.toMatch(/<[^>]+\son[a-z]+=/i)
  })
}

for (const path of [...PAGES, '/api/me', '/api/projects', '/sample-run.csv']) {
  test(`${path} is taken for what it says and tells no other site where it was`, async ({ request }) => {
    const headers = (await request.get(path)).headers()
    expect(headers['x-content-type-options']).toBe('nosniff')
    expect(headers['referrer-policy']).toBe('same-origin')
    expect(headers['x-powered-by']).toBeUndefined()
  })
}
