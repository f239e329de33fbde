import { del, get, set } from 'idb-keyval'
import { z } from 'zod'
import { importSettingsSchema } from '@/lib/schemas/import'
import { conversionSchema, driveTrainSchema } from '@/lib/schemas/recipe'
import { runFactsSchema } from '@/lib/schemas/run-facts'

/**
 * The open bench's file and what was said of it, kept in this browser alone, so that a reload or the way through sign-in
 * loses nothing. The settings of the analysis are not here: they stand in the address.
 */
const keptWorkSchema = z.object({
  version: z.literal(1),
  /** Tells the work of one tab from that of another; work that an older version kept has none. */
  id: z.string().optional(),
  fileName: z.string(),
  bytes: z.instanceof(Uint8Array<ArrayBuffer>),
  settings: importSettingsSchema,
  conversion: conversionSchema,
  facts: runFactsSchema,
  driveTrain: driveTrainSchema,
})
export type KeptWork = z.infer<typeof keptWorkSchema>

const key = 'turnwright-open-bench'
const tabKey = 'turnwright-open-bench-work'

/** An id for work that has just been opened. */
export function newWorkId(): string {
  // Not randomUUID: a browser has none over plain http.
  return [...crypto.getRandomValues(new Uint8Array(12))].map((byte) => byte.toString(16).padStart(2, '0')).join('')
}

/** Ties this tab, and so the settings in its address, to the work that it shows; null: to none. */
export function tieTabTo(id: string | null): void {
  try {
    if (id === null) window.sessionStorage.removeItem(tabKey)
    else window.sessionStorage.setItem(tabKey, id)
  } catch {
    // Without storage nothing is kept either.
  }
}

/** Whether another tab has put its own work in the place of what this tab showed: then this tab’s settings are not for it. */
export function isOfAnotherTab(work: KeptWork): boolean {
  try {
    const shown = window.sessionStorage.getItem(tabKey)
    return shown !== null && shown !== work.id
  } catch {
    return false
  }
}

/** Keeps the work; false where the browser has no room or no storage for it (private windows), which loses comfort only. */
export async function keepWork(work: KeptWork): Promise<boolean> {
  try {
    await set(key, work)
    return true
  } catch {
    return false
  }
}

/** The kept work, or undefined when there is none or it was kept by a version that wrote it differently. */
export async function findKeptWork(): Promise<KeptWork | undefined> {
  try {
    const parsed = keptWorkSchema.safeParse(await get(key))
    return parsed.success ? parsed.data : undefined
  } catch {
    return undefined
  }
}

/** Forgets this work; what another tab has kept meanwhile stays. */
export async function dropKeptWork(work: KeptWork): Promise<void> {
  try {
    const kept = await findKeptWork()
    if (kept && (work.id === undefined ? isSameFile(kept, work) : kept.id === work.id)) await del(key)
  } catch {
    // Nothing was kept where there is no storage.
  }
}

function isSameFile(a: KeptWork, b: KeptWork): boolean {
  if (a.fileName !== b.fileName || a.bytes.length !== b.bytes.length) return false
  return a.bytes.every((byte, index) => byte === b.bytes[index])
}
