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
  fileName: z.string(),
  bytes: z.instanceof(Uint8Array<ArrayBuffer>),
  settings: importSettingsSchema,
  conversion: conversionSchema,
  facts: runFactsSchema,
  driveTrain: driveTrainSchema,
})
export type KeptWork = z.infer<typeof keptWorkSchema>

const key = 'turnwright-open-bench'

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
    if (kept && isSameFile(kept, work)) await del(key)
  } catch {
    // Nothing was kept where there is no storage.
  }
}

function isSameFile(a: KeptWork, b: KeptWork): boolean {
  if (a.fileName !== b.fileName || a.bytes.length !== b.bytes.length) return false
  return a.bytes.every((byte, index) => byte === b.bytes[index])
}
