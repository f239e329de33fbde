'use client'

import { useState } from 'react'
import useSWR from 'swr'
import { Button } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { Dialog } from '@/components/ui/dialog'
import { getJson } from '@/lib/client/fetcher'
import { deletionSchema, type Deletion } from '@/lib/schemas/accounts'
import { DeleteAccountForm } from './delete-account-form'
import { DeletionPlan } from './deletion-plan'

/** Says what would be lost before anything can be. */
export function DeleteAccount({ email }: { email: string }) {
  const [isOpen, setOpen] = useState(false)
  const plan = useSWR<Deletion, Error>('/api/account/deletion', (url: string) => getJson(url, deletionSchema))

  async function open() {
    // What was read when the page opened may be out of date by now.
    await plan.mutate()
    setOpen(true)
  }

  return (
    <DataState what="what would be lost" data={plan.data} error={plan.error} onRetry={() => void plan.mutate()}>
      {(data) => (
        <div className="flex flex-col gap-4">
          <DeletionPlan plan={data} />
          {data.blocking.length > 0 ? null : (
            <div>
              <Button variant="danger" onClick={() => void open()}>
                Delete my account
              </Button>
            </div>
          )}
          <Dialog isOpen={isOpen} onClose={() => setOpen(false)} title="Delete your account for good">
            <DeletionPlan plan={data} />
            <DeleteAccountForm email={email} onClose={() => setOpen(false)} onBlocked={() => void plan.mutate()} />
          </Dialog>
        </div>
      )}
    </DataState>
  )
}
