'use client'

import { useMemo, useSyncExternalStore } from 'react'
import { z } from 'zod'
import { noteAnchorSchema, noteSchema } from '@/lib/schemas/api'

/**
 * Notes that are being written, kept for this tab: an accidental reload, an ended session or a note that somebody deletes
 * meanwhile loses none of the text. A draft is there as long as its editor is open.
 */
const draftSchema = z.object({
  anchor: noteAnchorSchema,
  text: z.string(),
  /** Members taken from the list; who is named is settled by the text. */
  chosenIds: z.array(z.string()),
  /** The note as it was when the change of it began; null for a new one. */
  base: noteSchema.nullable(),
})
export type NoteDraft = z.infer<typeof draftSchema>

const PREFIX = 'turnwright-note-draft'

/** Where a draft is kept: the analysis, and the note or the kind of place of a new one. */
export function draftKey(scope: string, slot: string): string {
  return `${PREFIX}:${scope}:${slot}`
}

/** Stands in where the browser keeps nothing (private windows): a reload then loses what was typed, nothing else does. */
const unkept = new Map<string, string>()
const parsed = new Map<string, { raw: string; draft: NoteDraft | null }>()
const listeners = new Set<() => void>()

function readRaw(key: string): string | null {
  try {
    return window.sessionStorage.getItem(key) ?? unkept.get(key) ?? null
  } catch {
    return unkept.get(key) ?? null
  }
}

function findDraft(key: string): NoteDraft | null {
  const raw = readRaw(key)
  if (raw === null) return null
  const known = parsed.get(key)
  if (known?.raw === raw) return known.draft
  const draft = parse(raw)
  parsed.set(key, { raw, draft })
  return draft
}

function parse(raw: string): NoteDraft | null {
  try {
    return draftSchema.safeParse(JSON.parse(raw)).data ?? null
  } catch {
    return null
  }
}

export function keepDraft(key: string, draft: NoteDraft): void {
  const raw = JSON.stringify(draft)
  try {
    window.sessionStorage.setItem(key, raw)
  } catch {
    unkept.set(key, raw)
  }
  tell()
}

export function dropDraft(key: string): void {
  unkept.delete(key)
  try {
    window.sessionStorage.removeItem(key)
  } catch {
    // Nothing was kept where there is no storage.
  }
  tell()
}

function tell() {
  for (const listener of listeners) listener()
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

/** The draft, as long as there is one; none while the server renders. */
export function useNoteDraft(key: string): NoteDraft | null {
  return useSyncExternalStore(
    subscribe,
    () => findDraft(key),
    () => null,
  )
}

/** Notes whose text is being changed here and that are no longer in the list: somebody deleted them. */
export function useDraftsOfGone(scope: string, presentIds: readonly string[] | undefined): NoteDraft[] {
  const slots = useSyncExternalStore(
    subscribe,
    () => slotsOf(scope),
    () => '',
  )
  return useMemo(() => {
    if (!presentIds) return []
    const present = new Set(presentIds)
    return slots
      .split('\n')
      .filter((slot) => slot !== '' && !present.has(slot))
      .flatMap((slot) => {
        const draft = findDraft(draftKey(scope, slot))
        return draft?.base ? [draft] : []
      })
  }, [slots, scope, presentIds])
}

/** The slots of a scope, one a line, so that equal ones compare as equal. */
function slotsOf(scope: string): string {
  const start = draftKey(scope, '')
  const keys = new Set(unkept.keys())
  try {
    for (let i = 0; i < window.sessionStorage.length; i++) keys.add(window.sessionStorage.key(i) ?? '')
  } catch {
    // Those in memory are all there are.
  }
  return [...keys]
    .filter((key) => key.startsWith(start))
    .map((key) => key.slice(start.length))
    .sort()
    .join('\n')
}
