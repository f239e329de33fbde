import { projectSchema, type Project } from '@/lib/schemas/api'
import { MAX_ARCHIVE_BYTES } from '@/lib/schemas/archive'
import { formatBytes } from '@/lib/units'
import { refusal, RequestError } from './fetcher'

interface Sending {
  /** 0 … 1 of the bytes that have gone out; at 1 the server checks them. */
  onProgress: (fraction: number) => void
  signal: AbortSignal
}

/** Why a file is not worth sending, or null. */
export function archiveFileFault({ name, size }: { name: string; size: number }): string | null {
  if (size === 0) return `${name} is empty. Choose the ZIP that “Download everything” gave you.`
  if (size > MAX_ARCHIVE_BYTES) return `${name} has ${formatBytes(size)}; 1 GB is the most that can be brought in.`
  return null
}

/** Sends an archive and tells how far it is; `fetch` tells nothing of what has gone out. */
export function importArchive(file: File, { onProgress, signal }: Sending): Promise<Project> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest()
    const unreachable = (message: string) => reject(new RequestError(message, { status: 0, code: 'unreachable' }))
    request.upload.onprogress = ({ loaded, total }) => onProgress(total > 0 ? loaded / total : 0)
    request.upload.onload = () => onProgress(1)
    request.onerror = () => unreachable('The connection broke off. Nothing was brought in; try again.')
    request.onabort = () => unreachable('Stopped. Nothing was brought in.')
    request.onload = () => {
      const { status, responseText } = request
      const response = new Response(responseText, { status })
      if (!response.ok) return void refusal(response).then(reject)
      const parsed = projectSchema.safeParse(jsonOf(responseText))
      if (parsed.success) resolve(parsed.data)
      else unreachable('The server’s answer could not be read. Look at your projects before you try again.')
    }
    signal.addEventListener('abort', () => request.abort(), { once: true })
    request.open('POST', '/api/projects/import')
    request.setRequestHeader('accept', 'application/json')
    request.setRequestHeader('content-type', 'application/zip')
    request.send(file)
  })
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return undefined
  }
}
