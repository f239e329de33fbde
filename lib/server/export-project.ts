import 'server-only'
import { createHash } from 'node:crypto'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { ENGINE_VERSION } from '@/lib/analysis/constants'
import { ARCHIVE_FORMAT, ARCHIVE_VERSION } from '@/lib/schemas/archive'
import appPackage from '@/package.json'
import { createGate } from './gate'
import { jsonFile, projectFiles, type ProjectFile } from './project-files'
import { zipDownload, type ZipSink } from './zip-stream'

/** Each download holds a connection to the database for as long as it lasts. */
const gate = createGate(4, 'Several projects are being downloaded just now. Try again in a moment.')

/**
 * The whole project as a ZIP that is made while it is read, of one state of the database. The answer comes at once; the
 * connection is given back when the last byte is taken, or when the reader goes away.
 */
export function exportProject(access: ProjectAccess): Promise<ReadableStream<Uint8Array<ArrayBuffer>>> {
  return new Promise((resolve, reject) => {
    const download = async () => {
      const { stream, finished } = zipDownload((zip) => writeProject(zip, access))
      resolve(stream)
      await finished
    }
    gate(download).catch(reject)
  })
}

function writeProject(zip: ZipSink, access: ProjectAccess): Promise<void> {
  return database()
    .transaction()
    .setIsolationLevel('repeatable read')
    .setAccessMode('read only')
    .execute(async (trx) => {
      const files = []
      for await (const file of projectFiles(trx, access)) files.push(await writeFile(zip, file))
      const manifest = jsonFile('manifest.json', 'manifest', {
        format: ARCHIVE_FORMAT,
        version: ARCHIVE_VERSION,
        exportedAt: new Date().toISOString(),
        madeBy: { name: 'Turnwright', version: appPackage.version, engineVersion: ENGINE_VERSION },
        files,
      })
      await writeFile(zip, manifest)
    })
}

/** Writes one file and answers how the manifest lists it. */
async function writeFile(zip: ZipSink, file: ProjectFile) {
  const hash = createHash('sha256')
  const { path } = file
  if ('text' in file) {
    const bytes = new TextEncoder().encode(file.text)
    await zip.add(path, bytes)
    return { path, byteLength: bytes.length, sha256: hash.update(bytes).digest('hex') }
  }
  const hashed = async function* () {
    for await (const part of file.parts) {
      hash.update(part)
      yield part
    }
  }
  await zip.addStream(path, file.byteLength, hashed())
  return { path, byteLength: file.byteLength, sha256: hash.digest('hex') }
}
