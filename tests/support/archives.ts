import { createHash } from 'node:crypto'
import { Uint8ArrayReader, Uint8ArrayWriter, ZipReader, ZipWriter } from '@zip.js/zip.js'
import { expect } from 'vitest'
import { GET as downloadArchive } from '@/app/api/projects/[projectId]/archive/route'
import { POST as importArchive } from '@/app/api/projects/import/route'
import type { Project } from '@/lib/schemas/api'
import { call } from './test-server'

export type Files = Map<string, Uint8Array<ArrayBuffer>>

const OPTIONS = { useWebWorkers: false }

export async function unzip(bytes: Uint8Array<ArrayBuffer>): Promise<Files> {
  const entries = await new ZipReader(new Uint8ArrayReader(bytes), OPTIONS).getEntries()
  const files: Files = new Map()
  for (const entry of entries) {
    if (!entry.directory) files.set(entry.filename, await entry.getData(new Uint8ArrayWriter(), OPTIONS))
  }
  return files
}

export async function zipped(files: Files, options: { password?: string } = {}): Promise<Uint8Array<ArrayBuffer>> {
  const writer = new ZipWriter(new Uint8ArrayWriter(), { ...OPTIONS, ...options })
  for (const [path, bytes] of files) await writer.add(path, new Uint8ArrayReader(bytes))
  return writer.close()
}

export async function download(projectId: string, cookie: string): Promise<Uint8Array<ArrayBuffer>> {
  const response = await call(downloadArchive, '/', { projectId }, { cookie })
  expect(response.status).toBe(200)
  return new Uint8Array(await response.arrayBuffer())
}

export function upload(body: Uint8Array<ArrayBuffer> | ReadableStream, cookie: string): Promise<Response> {
  return call(importArchive, '/', {}, { method: 'POST', body, cookie })
}

export async function bringIn(archive: Uint8Array<ArrayBuffer>, cookie: string): Promise<Project> {
  const response = await upload(archive, cookie)
  const body = await response.json()
  expect([response.status, body.error]).toEqual([201, undefined])
  return body
}

export function textOf(files: Files, path: string): string {
  return new TextDecoder().decode(files.get(path))
}

export const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex')

/** Changes a file and what the manifest says of it, as somebody would who wants the archive to look whole. */
export function replaceFile(files: Files, path: string, bytes: Uint8Array<ArrayBuffer> | null): void {
  const manifest = JSON.parse(textOf(files, 'manifest.json'))
  manifest.files = manifest.files.filter((file: { path: string }) => bytes !== null || file.path !== path)
  const listed = manifest.files.find((file: { path: string }) => file.path === path)
  if (bytes === null) files.delete(path)
  else {
    files.set(path, bytes)
    const entry = { path, byteLength: bytes.length, sha256: sha256(bytes) }
    if (listed) Object.assign(listed, entry)
    else manifest.files.push(entry)
  }
  files.set('manifest.json', new TextEncoder().encode(JSON.stringify(manifest)))
}

/** What two archives of the same content share: all but when they were made, and who had access. */
export function comparable(files: Files): Record<string, string> {
  const shown: Record<string, string> = {}
  for (const [path, bytes] of files) {
    if (path !== 'people.csv') shown[path] = path.endsWith('.json') ? textOf(files, path) : sha256(bytes)
  }
  const manifest = JSON.parse(shown['manifest.json'])
  manifest.exportedAt = 'some time'
  manifest.files = manifest.files.map((file: { path: string }) =>
    file.path === 'people.csv' ? { path: file.path } : file,
  )
  shown['manifest.json'] = JSON.stringify(manifest)
  return shown
}
