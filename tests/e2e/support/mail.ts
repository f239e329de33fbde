import { expect, type APIRequestContext } from '@playwright/test'
import { localMailListSchema, localMailSchema } from '@/lib/schemas/local-mail'
import { SERVER_ORIGIN } from './server'

const ADDRESS = '/api/local-mail'

export interface ReceivedMail {
  subject: string
  text: string
  /** The addresses in its text, in their order. */
  links: string[]
}

interface Wanted {
  to: string
  subject: string | RegExp
  /** Newest one that is waited for must have come after this moment; left out: whenever. */
  since?: Date
  timeoutMs?: number
}

/** Waits until the local mail server has taken such a mail, and answers the newest one. */
export async function waitForMail(
  request: APIRequestContext,
  { to, subject, since, timeoutMs = 45_000 }: Wanted,
): Promise<ReceivedMail> {
  let name = ''
  const fits = (text: string) => (typeof subject === 'string' ? text.includes(subject) : subject.test(text))
  await expect(async () => {
    const { mails } = localMailListSchema.parse(await (await request.get(ADDRESS)).json())
    const found = mails.find(
      (mail) =>
        mail.to.toLowerCase() === to.toLowerCase() && fits(mail.subject) && (!since || new Date(mail.at) >= since),
    )
    expect(found, `a mail to ${to} about ${subject}`).toBeDefined()
    name = found?.name ?? ''
  }).toPass({ timeout: timeoutMs, intervals: [200, 500, 1000] })
  const mail = localMailSchema.parse(await (await request.get(`${ADDRESS}/${name}`)).json())
  return { subject: mail.subject, text: mail.text, links: mail.links }
}

/** Makes the local mail server turn every mail away, as a server that is down does, or take mail again. */
export async function setMailRefusing(request: APIRequestContext, isRefusing: boolean): Promise<void> {
  const answer = await request.put(`${ADDRESS}/refusing`, { data: { isRefusing }, headers: { origin: SERVER_ORIGIN } })
  expect(answer.status()).toBe(200)
}
