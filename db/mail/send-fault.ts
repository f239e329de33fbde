export interface SendFault {
  /** For people: what happened and what comes of it; names no address, server or secret. */
  words: string
  /** Whether another attempt could end otherwise. */
  isForGood: boolean
  /** For the log: codes only, since a server's own words may repeat addresses. */
  code: string
}

/** RFC 5321, 4.2.2 and 4.2.3: the mailbox does not exist, is not local, or its name is not allowed. */
const NO_SUCH_MAILBOX = [550, 551, 553]

interface MailError {
  code?: string
  responseCode?: number
  command?: string
}

function told(error: unknown): MailError {
  const wanted: Error & MailError = error instanceof Error ? error : new Error()
  return wanted
}

/** Puts what nodemailer throws into one of a few sentences. */
export function sendFault(error: unknown): SendFault {
  const { code, responseCode, command } = told(error)
  const codes = [code, responseCode].filter((part) => part !== undefined).join(' ')
  if (code === 'EENVELOPE' && command?.startsWith('RCPT') && NO_SUCH_MAILBOX.includes(responseCode ?? 0)) {
    const words = 'The mail server says that nobody receives mail at this address. Check how it is spelt.'
    return { words, isForGood: true, code: codes }
  }
  if (code === 'EAUTH') {
    const words = 'The mail server does not let Turnwright in. Whoever runs it must look at SMTP_URL; the mail waits.'
    return { words, isForGood: false, code: codes }
  }
  const words = responseCode
    ? 'The mail server did not take the mail. It is sent again by itself.'
    : 'The mail server can’t be reached. The mail is sent by itself once it can.'
  return { words, isForGood: false, code: codes || 'unknown' }
}
