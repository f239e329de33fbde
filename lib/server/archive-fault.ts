import 'server-only'
import { AppError } from './errors'

/** An archive that can't be brought in: what is wrong with which entry, and what to do. */
export function badArchive(message: string, entries: Record<string, string> = {}): AppError {
  return new AppError('bad-archive', message, Object.keys(entries).length > 0 ? { fields: entries } : {})
}

const MOST_FAULTS = 20

/** Gathers faults of single entries, so that a person learns of all of them at once. */
export class ArchiveFaults {
  private readonly entries = new Map<string, string>()

  add(path: string, message: string): void {
    if (!this.entries.has(path)) this.entries.set(path, message)
    if (this.entries.size >= MOST_FAULTS) this.throwIfAny()
  }

  has(path: string): boolean {
    return this.entries.has(path)
  }

  /** @throws {AppError} bad-archive that names each entry, when there are faults */
  throwIfAny(): void {
    if (this.entries.size === 0) return
    const [[path, message]] = this.entries
    const more = this.entries.size - 1
    const others = more === 0 ? '' : more === 1 ? ' One more entry is at fault.' : ` ${more} more entries are at fault.`
    throw badArchive(`${path}: ${message}${others} Nothing was brought in.`, Object.fromEntries(this.entries))
  }
}
