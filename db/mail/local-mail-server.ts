import type { AddressInfo } from 'node:net'
import { SMTPServer, type SMTPServerError } from 'smtp-server'
import { isLocalMailRefusing, keepLocalMail } from './local-mail-folder'

const LARGEST_MESSAGE_BYTES = 2 * 1024 * 1024

export interface LocalMailServer {
  port: number
  stop: () => Promise<void>
}

interface LocalMailOptions {
  folder: string
  /** 0: a free one. */
  port?: number
  /** How many of the newest messages are kept. */
  most?: number
}

function refusal(responseCode: number, message: string): SMTPServerError {
  return Object.assign(new Error(message), { responseCode })
}

/** A mail server on 127.0.0.1 that sends nothing on: every message it takes becomes a file in the folder. */
export async function startLocalMailServer({ folder, port = 0, most }: LocalMailOptions): Promise<LocalMailServer> {
  const server = new SMTPServer({
    name: 'turnwright.localhost',
    banner: 'Turnwright keeps what comes here',
    size: LARGEST_MESSAGE_BYTES,
    // Nothing leaves this machine, so there is neither encryption nor sign-in.
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    closeTimeout: 2000,
    onConnect(_session, done) {
      if (isLocalMailRefusing(folder)) return done(refusal(421, 'Refusing for a while, as told'))
      done()
    },
    onMailFrom(_address, _session, done) {
      // A connection that was open already finds the server down as well.
      if (isLocalMailRefusing(folder)) return done(refusal(421, 'Refusing for a while, as told'))
      done()
    },
    onData(stream, _session, done) {
      const parts: Buffer[] = []
      stream.on('data', (part: Buffer) => {
        if (!stream.sizeExceeded) parts.push(part)
      })
      stream.on('end', () => {
        if (stream.sizeExceeded) return done(refusal(552, 'Too large'))
        keepLocalMail(folder, Buffer.concat(parts), most).then(
          () => done(),
          () => done(refusal(452, 'Could not be kept')),
        )
      })
    },
  })
  // A sender that breaks off is no fault of ours.
  server.on('error', () => {})
  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject)
    server.listen(port, '127.0.0.1', () => {
      server.server.off('error', reject)
      resolve()
    })
  })
  const address = server.server.address() as AddressInfo
  return { port: address.port, stop: () => new Promise((resolve) => server.close(() => resolve())) }
}
