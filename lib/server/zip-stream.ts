import 'server-only'
import { Uint8ArrayReader, ZipWriter } from '@zip.js/zip.js'

/** The one time that every file in an archive bears, so that equal content gives equal files. */
const FIXED_DATE = new Date(1980, 0, 1)

/** Longest wait for a reader that takes nothing more: it holds a connection to the database. */
const IDLE_MS = 120_000

export interface ZipSink {
  add(path: string, content: Uint8Array): Promise<void>
  /** A file that is read while it is written; `byteLength` is the length that it will have. */
  addStream(path: string, byteLength: number, parts: AsyncIterable<Uint8Array>): Promise<void>
}

export interface ZipDownload {
  stream: ReadableStream<Uint8Array<ArrayBuffer>>
  /** Settles when all is written, or when the reader has gone; never rejects. */
  finished: Promise<void>
}

/**
 * A ZIP that is made while it is read: `write` waits until the reader takes what is there. When the reader goes away or
 * stops reading, the sink throws and `write` ends; when `write` throws, the reader's stream breaks.
 */
export function zipDownload(write: (zip: ZipSink) => Promise<void>): ZipDownload {
  const pipe = new TransformStream<Uint8Array<ArrayBuffer>, Uint8Array<ArrayBuffer>>()
  const zip = new ZipWriter(pipe.writable, {
    lastModDate: FIXED_DATE,
    extendedTimestamp: false,
    useWebWorkers: false,
    keepOrder: true,
  })
  const sink: ZipSink = {
    add: async (path, content) => void (await zip.add(path, new Uint8ArrayReader(content))),
    addStream: async (path, byteLength, parts) =>
      void (await zip.add(path, streamOf(parts), { uncompressedSize: byteLength })),
  }
  const finished = write(sink)
    .then(() => zip.close())
    .then(
      () => {},
      (error: unknown) => pipe.writable.abort(error).catch(() => {}),
    )
  return { stream: whileRead(pipe.readable), finished }
}

function streamOf(parts: AsyncIterable<Uint8Array>): ReadableStream<Uint8Array> {
  const iterator = parts[Symbol.asyncIterator]()
  return new ReadableStream<Uint8Array>(
    {
      async pull(controller) {
        const { done, value } = await iterator.next()
        if (done) controller.close()
        else controller.enqueue(value)
      },
      async cancel() {
        await iterator.return?.()
      },
    },
    { highWaterMark: 0 },
  )
}

/** The same stream, given up once nobody has taken anything for a while, or nobody ever began. */
function whileRead(source: ReadableStream<Uint8Array<ArrayBuffer>>): ReadableStream<Uint8Array<ArrayBuffer>> {
  const reader = source.getReader()
  let timer: NodeJS.Timeout | undefined
  return new ReadableStream(
    {
      start(controller) {
        timer = whenIdle(controller)
      },
      async pull(controller) {
        clearTimeout(timer)
        const { done, value } = await reader.read()
        if (done) return controller.close()
        controller.enqueue(value)
        timer = whenIdle(controller)
      },
      async cancel(reason) {
        clearTimeout(timer)
        await reader.cancel(reason)
      },
    },
    { highWaterMark: 0 },
  )

  function whenIdle(controller: ReadableStreamDefaultController): NodeJS.Timeout {
    const giveUp = () => {
      const reason = new Error('Nobody has read on for a while')
      controller.error(reason)
      void reader.cancel(reason).catch(() => {})
    }
    return setTimeout(giveUp, IDLE_MS).unref()
  }
}
