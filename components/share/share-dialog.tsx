'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Notice } from '@/components/ui/notice'
import type { Note } from '@/lib/schemas/api'
import type { ShareLink } from '@/lib/schemas/share'
import { ShareLinkEntry } from './share-link-entry'
import { ShareLinkForm } from './share-link-form'
import { useShareLinks } from './use-share-links'

interface ShareButtonProps {
  projectId: string
  analysisId: string
  notes: readonly Note[]
  /** In an archived project links are only looked at and revoked. */
  isArchived?: boolean
}

/** “Share”, and the panel where links to this analysis are made, handed on and taken back. */
export function ShareButton(props: ShareButtonProps) {
  const [isOpen, setOpen] = useState(false)
  return (
    <>
      <Button onClick={() => setOpen(true)}>{props.isArchived ? 'Share links' : 'Share'}</Button>
      <Dialog
        isOpen={isOpen}
        onClose={() => setOpen(false)}
        title={props.isArchived ? 'Links to this analysis' : 'Share this analysis'}
        className="max-w-2xl"
      >
        <SharePanel {...props} onClose={() => setOpen(false)} />
      </Dialog>
    </>
  )
}

type Work = { kind: 'look' } | { kind: 'make' } | { kind: 'change'; link: ShareLink }

function SharePanel({
  projectId,
  analysisId,
  notes,
  isArchived = false,
  onClose,
}: ShareButtonProps & { onClose: () => void }) {
  const { links, error, reload, make, change, revoke } = useShareLinks(projectId, analysisId)
  const [work, setWork] = useState<Work>({ kind: 'look' })
  const look = () => setWork({ kind: 'look' })
  const isFirst = links?.length === 0

  return (
    <div className="flex flex-col gap-4">
      <Notice tone="warning" title="Anyone who has a link can read the report">
        It needs no account and can be passed on. It shows the figures and pictures of this analysis, the names of mount
        and run, and the notes that you choose; not the file, and nothing else of the project. It goes on when whoever
        made it leaves the project; every owner and editor can revoke it here.
      </Notice>
      {work.kind === 'change' ? (
        <ShareLinkForm
          key={`${work.link.id} ${work.link.version}`}
          link={work.link}
          notes={notes}
          onSend={async (fields, version) => {
            await change(work.link.id, { ...fields, version })
            look()
          }}
          onTakeTheirs={(link) => setWork({ kind: 'change', link })}
          onCancel={look}
        />
      ) : (
        <DataState what="the links" data={links} error={error} onRetry={reload}>
          {(all) => (
            <>
              {isArchived ? (
                <p>
                  {isFirst
                    ? 'No link leads to this analysis. New ones can be made once an owner opens the project again.'
                    : 'Links go on while the project is archived. They can be revoked here, and changed once an owner opens the project again.'}
                </p>
              ) : null}
              {!isArchived && (work.kind === 'make' || isFirst) ? (
                <ShareLinkForm
                  link={null}
                  notes={notes}
                  onSend={async (fields) => {
                    await make(fields)
                    look()
                  }}
                  onCancel={isFirst ? onClose : look}
                />
              ) : (
                <>
                  {all.length > 0 ? (
                    <ul aria-label="Links to this analysis">
                      {all.map((link) => (
                        <ShareLinkEntry
                          key={link.id}
                          link={link}
                          onChange={isArchived ? undefined : () => setWork({ kind: 'change', link })}
                          onRevoke={() => revoke(link.id)}
                        />
                      ))}
                    </ul>
                  ) : null}
                  <Actions className="mt-0">
                    <Button onClick={onClose}>Close</Button>
                    {isArchived ? null : (
                      <Button variant="primary" onClick={() => setWork({ kind: 'make' })}>
                        Make another link
                      </Button>
                    )}
                  </Actions>
                </>
              )}
            </>
          )}
        </DataState>
      )}
    </div>
  )
}
