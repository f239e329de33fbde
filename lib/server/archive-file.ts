import 'server-only'
import { mkdtemp, open, readdir, rm, stat, type FileHandle } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { Reader, ZipReader, type FileEntry } from '@zip.js/zip.js'
import { MAX_ARCHIVE_BYTES } from '@/lib/schemas/archive'
import { badArchive } from './archive-fault'
import { bodyParts } from './body'
import { AppError } from './errors'

export const ARCHIVE_LIMITS = {
  mostEntries: 100_000,
  /** All entries unpacked, by what was really read. */
  mostUnpackedBytes: 4 * 1024 * 1024 * 1024,
  /** An archive that unpacks to more than this must not be packed more tightly than mostRatio. */
  ratioFreeBytes: 512 * 1024 * 1024,
  mostRatio: 200,
} as const

/** Largest list of entries, as bytes of the ZIP's directory; it is read as a whole. */
const MOST_DIRECTORY_BYTES = 64 * 1024 * 1024

const BODY_LIMITS = {
  mostBytes: MAX_ARCHIVE_BYTES,
  tooLargeMessage: 'The archive is larger than 1 GB, the most that can be brought in.',
}

const FOLDER_PREFIX = 'turnwright-archive-'
/** Longer than any archive takes to be brought in. */
const LEFT_BEHIND_MS = 24 * 3_600_000

/** Takes away what a server that was killed amid its work has left: up to 1 GB each time. */
async function sweepLeftBehind(): Promise<void> {
  const names = (await readdir(tmpdir())).filter((name) => name.startsWith(FOLDER_PREFIX))
  for (const path of names.map((name) => join(tmpdir(), name))) {
    // Gone meanwhile, or another user's.
    const found = await stat(path).catch(() => null)
    if (!found || Date.now() - found.mtimeMs < LEFT_BEHIND_MS) continue
    await rm(path, { recursive: true, force: true }).catch(() => {})
  }
}

/** A folder of our own for as long as `work` lasts; whatever happens, it is gone afterwards. */
export async function inTemporaryFolder<T>(work: (folder: string) => Promise<T>): Promise<T> {
  await sweepLeftBehind()
  const folder = await mkdtemp(join(tmpdir(), FOLDER_PREFIX))
  try {
    return await work(folder)
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}

/** Writes the body to a file as it arrives. */
export async function receiveArchive(request: Request, path: string): Promise<void> {
  const file = await open(path, 'wx', 0o600)
  try {
    for await (const part of bodyParts(request, BODY_LIMITS)) await file.writeFile(part)
  } finally {
    await file.close()
  }
}

class FileReader extends Reader<FileHandle> {
  constructor(
    private readonly file: FileHandle,
    override size: number,
  ) {
    super(file)
  }

  override async readUint8Array(index: number, length: number): Promise<Uint8Array> {
    if (length > MOST_DIRECTORY_BYTES)
      throw badArchive('Its list of entries is too long. No archive of ours is like it.')
    const bytes = new Uint8Array(Math.max(0, Math.min(length, this.size - index)))
    const { bytesRead } = await this.file.read(bytes, 0, bytes.length, index)
    return bytes.subarray(0, bytesRead)
  }
}

const READING = { useWebWorkers: false, checkOverlappingEntry: true } as const

/** The entries of a ZIP on disk by path; none of them is read before it is asked for. */
export class ArchiveFile {
  /** Of entries read for the first time: what is read once more when it is written counts once. */
  private unpackedBytes = 0
  private readonly readBefore = new Set<string>()

  private constructor(
    private readonly file: FileHandle,
    private readonly packedBytes: number,
    private readonly entries: ReadonlyMap<string, FileEntry>,
  ) {}

  /** @throws {AppError} bad-archive when the file is no ZIP, or one that names its entries in a way that ours never do */
  static async open(path: string): Promise<ArchiveFile> {
    const file = await open(path)
    try {
      const { size } = await file.stat()
      return new ArchiveFile(file, size, await listEntries(new FileReader(file, size)))
    } catch (error) {
      await file.close()
      throw error
    }
  }

  get paths(): string[] {
    return [...this.entries.keys()]
  }

  has(path: string): boolean {
    return this.entries.has(path)
  }

  /** Hands the entry's bytes over as they are unpacked, at most `mostBytes` of them. */
  async read(path: string, mostBytes: number, onPart: (part: Uint8Array) => void): Promise<void> {
    const entry = this.entries.get(path)
    if (!entry) throw badArchive(`${path} is missing. Download the archive again, and bring it in unchanged.`)
    let length = 0
    const isAgain = this.readBefore.has(path)
    this.readBefore.add(path)
    const sink = new WritableStream<Uint8Array>({
      write: (part) => {
        length += part.byteLength
        if (!isAgain) this.unpackedBytes += part.byteLength
        if (length > mostBytes) throw tooMuch(path, 'is larger than it says or may be')
        this.assertBearable(path)
        onPart(part)
      },
    })
    try {
      await entry.getData(sink, READING)
    } catch (error) {
      if (error instanceof AppError) throw error
      throw damaged(path, error)
    }
  }

  private assertBearable(path: string): void {
    const { mostUnpackedBytes, ratioFreeBytes, mostRatio } = ARCHIVE_LIMITS
    if (this.unpackedBytes > mostUnpackedBytes) throw tooMuch(path, 'brings the archive over 4 GB unpacked')
    if (this.unpackedBytes > ratioFreeBytes && this.unpackedBytes > mostRatio * this.packedBytes) {
      throw tooMuch(path, `unpacks the archive to more than ${mostRatio} times its size`)
    }
  }

  close(): Promise<void> {
    return this.file.close()
  }
}

function tooMuch(path: string, what: string): AppError {
  return badArchive(`${path} ${what}. Download the archive again, and bring it in unchanged.`, { [path]: what })
}

function damaged(path: string, error: unknown): AppError {
  const reason = error instanceof Error ? error.message : 'it can’t be unpacked'
  const message = `${path} is damaged (${reason}). Download the archive again, and bring it in unchanged.`
  return badArchive(message, { [path]: `damaged (${reason})` })
}

async function listEntries(reader: FileReader): Promise<Map<string, FileEntry>> {
  const zip = new ZipReader(reader, {
    useWebWorkers: false,
    // assertPlainPath judges the names, so that the person learns which one it is.
    filenameValidation: 'tolerant',
  })
  const entries = new Map<string, FileEntry>()
  const seen = new Set<string>()
  try {
    let count = 0
    for await (const entry of zip.getEntriesGenerator()) {
      const { filename } = entry
      count += 1
      if (count > ARCHIVE_LIMITS.mostEntries) {
        throw badArchive(`It holds more than ${ARCHIVE_LIMITS.mostEntries} entries. No archive of ours does.`)
      }
      assertPlainPath(filename)
      const folded = filename.normalize('NFC').toLowerCase()
      if (seen.has(folded)) throw badArchive(`${filename} is in it twice. Bring in the archive as it was downloaded.`)
      seen.add(folded)
      if (entry.encrypted) {
        throw badArchive(`${filename} is encrypted. Bring in the archive as it was downloaded, without a password.`)
      }
      if (!entry.directory) entries.set(filename, entry)
    }
  } catch (error) {
    if (error instanceof AppError) throw error
    throw badArchive(
      'This is no ZIP that can be read, or only a part of one. Choose the file that “Download everything” gave you; if it is that one, download it again.',
    )
  }
  return entries
}

/** Entries are never written to paths of their own, yet one that tries to leave the archive shows that somebody tampered. */
function assertPlainPath(path: string): void {
  const parts = path.replace(/\/$/, '').split('/')
  if (path.length > 400 || /[\\\0:]/.test(path) || parts.some((part) => ['', '.', '..'].includes(part))) {
    const shown = JSON.stringify(path.slice(0, 100))
    throw badArchive(
      `The entry ${shown} lies outside the archive. Do not bring in archives from people you do not trust.`,
    )
  }
}
