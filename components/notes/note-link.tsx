'use client'

import { createContext, useContext, useMemo, useState, type ReactNode } from 'react'

interface NoteLink {
  /** The note that is pointed at or has the focus, in the list or on a picture. */
  activeId: string | null
  setActive: (noteId: string | null) => void
  /** Whether settled notes are marked on the pictures. */
  areSettledMarked: boolean
  setSettledMarked: (areMarked: boolean) => void
}

const Context = createContext<NoteLink>({
  activeId: null,
  setActive: () => undefined,
  areSettledMarked: true,
  setSettledMarked: () => undefined,
})

/** Ties the notes of a bench to their marks on its pictures. */
export function NoteLinkProvider({ children }: { children: ReactNode }) {
  const [activeId, setActive] = useState<string | null>(null)
  const [areSettledMarked, setSettledMarked] = useState(true)
  const link = useMemo(
    () => ({ activeId, setActive, areSettledMarked, setSettledMarked }),
    [activeId, areSettledMarked],
  )
  return <Context value={link}>{children}</Context>
}

export function useNoteLink(): NoteLink {
  return useContext(Context)
}
