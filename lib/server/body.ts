import 'server-only'
import { AppError } from './errors'

export interface BodyLimits {
  /** Refused as 'too-large' with this message once more bytes arrive, or are announced. */
  mostBytes: number
  tooLargeMessage: string
  /** Longest silence of the sender. */
  idleSeconds?: number
}

async function withinSeconds<T>(pending: Promise<T>, seconds: number): Promise<T> {
  let timer: NodeJS.Timeout | undefined
  const stalled = new Promise<never>((_, reject) => {
    const error = new AppError(
      'upload-stalled',
      `Nothing arrived for ${seconds} s. Check the connection and try again.`,
    )
    timer = setTimeout(() => reject(error), seconds * 1000)
  })
  try {
    return await Promise.race([pending, stalled])
  } finally {
    clearTimeout(timer)
  }
}

/** The sender went away; nobody may be left to read this. */
function brokenOff(): never {
  throw new AppError('upload-incomplete', 'The connection broke off. Nothing was kept; send the file again.')
}

/** The parts of a body as they arrive. Compares what came with what Content-Length announced: a cut body is refused. */
export async function* bodyParts(request: Request, limits: BodyLimits): AsyncGenerator<Uint8Array> {
  const { mostBytes, tooLargeMessage, idleSeconds = 30 } = limits
  const announced = request.headers.get('content-length')
  const tooLarge = new AppError('too-large', tooLargeMessage)
  const reader = request.body?.getReader()
  let received = 0
  let isFinished = false
  try {
    if (Number(announced ?? 0) > mostBytes) throw tooLarge
    while (reader) {
      const { done, value } = await withinSeconds(reader.read().catch(brokenOff), idleSeconds)
      if (done) break
      received += value.byteLength
      if (received > mostBytes) throw tooLarge
      yield value
    }
    isFinished = true
  } finally {
    if (!isFinished && reader) await drain(reader, mostBytes)
  }
  if (announced !== null && received !== Number(announced)) {
    const message = `Only ${received} of ${announced} bytes arrived. Nothing was kept; send the file again.`
    throw new AppError('upload-incomplete', message)
  }
}

/**
 * Reads on for a while without keeping anything: a browser that is still sending would see a broken connection instead
 * of our answer. Ends without complaint, whatever the sender does.
 */
async function drain(reader: ReadableStreamDefaultReader<Uint8Array>, mostBytes: number): Promise<void> {
  const deadline = Date.now() + 20_000
  let dropped = 0
  try {
    while (dropped < mostBytes && Date.now() < deadline) {
      const { done, value } = await withinSeconds(reader.read(), 5)
      if (done) return
      dropped += value.byteLength
    }
    await reader.cancel()
  } catch {
    await reader.cancel().catch(() => {})
  }
}
