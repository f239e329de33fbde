'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm, useWatch } from 'react-hook-form'
import { useSWRConfig } from 'swr'
import type { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { Select } from '@/components/ui/select'
import { TextInput } from '@/components/ui/text-input'
import { RequestError, sendJson } from '@/lib/client/fetcher'
import { invitationsUrl } from '@/lib/client/people-data'
import { showServerFaults } from '@/lib/client/server-fields'
import { capitalised } from '@/lib/findings/words'
import { invitationSchema, newInvitationSchema, type Invitation } from '@/lib/schemas/people'
import { aRole, mayDo } from '@/lib/schemas/rights'
import { ROLE_OPTIONS } from './role-options'

type Values = z.input<typeof newInvitationSchema>

interface Refused {
  text: string
  /** The invitation that waits already. */
  earlier: Invitation | null
}

/** Invites an address; what was typed stays until the mail is on its way. */
export function InviteForm({ projectId }: { projectId: string }) {
  const { mutate } = useSWRConfig()
  const [sentTo, setSentTo] = useState<Invitation | null>(null)
  const [refused, setRefused] = useState<Refused | null>(null)
  const { register, handleSubmit, setError, control, reset, formState } = useForm<Values>({
    resolver: zodResolver(newInvitationSchema),
    defaultValues: { email: '', role: 'viewer' },
  })
  const role = useWatch({ control, name: 'role' })
  const url = invitationsUrl(projectId)

  async function send(work: () => Promise<Invitation>) {
    setRefused(null)
    setSentTo(null)
    try {
      const invitation = await work()
      setSentTo(invitation)
      reset({ email: '', role: invitation.role })
    } catch (error) {
      const text = showServerFaults(error, ['email', 'role'], setError)
      const earlier = error instanceof RequestError ? invitationSchema.safeParse(error.current).data : undefined
      setRefused(text === null ? null : { text, earlier: earlier ?? null })
    } finally {
      void mutate(url)
    }
  }

  return (
    <form
      method="post"
      noValidate
      className="flex flex-col gap-4"
      onSubmit={handleSubmit((values) => send(() => sendJson('POST', url, values, invitationSchema)))}
    >
      <div className="flex flex-wrap items-start gap-x-4 gap-y-3">
        <Field label="E-mail" error={formState.errors.email?.message} className="min-w-64 flex-1">
          {(field) => <TextInput {...field} type="email" autoComplete="off" {...register('email')} />}
        </Field>
        <Field label="Role" error={formState.errors.role?.message} className="w-36">
          {(field) => <Select {...field} options={ROLE_OPTIONS} {...register('role')} />}
        </Field>
      </div>
      <p className="text-sm text-soft" aria-live="polite">
        {capitalised(aRole(role))} may {mayDo(role)}.
      </p>
      {role === 'owner' ? (
        <Notice tone="warning">
          An owner can do all that you can: also remove you, take your role from you, and delete the project.
        </Notice>
      ) : null}
      {refused ? (
        <Notice
          tone="error"
          title="No mail was sent"
          isLive
          actions={
            refused.earlier ? (
              <Button
                onClick={() =>
                  void send(() => sendJson('POST', `${url}/${refused.earlier?.id}/resend`, {}, invitationSchema))
                }
              >
                Send it again
              </Button>
            ) : null
          }
        >
          {refused.text}
        </Notice>
      ) : null}
      {sentTo ? (
        <Notice tone="good" isLive>
          {sentTo.email} is invited as {sentTo.role}. The mail with the link is on its way; the link holds for two weeks
          and lets one person in.
        </Notice>
      ) : null}
      <div>
        <Button type="submit" variant="primary" disabled={formState.isSubmitting}>
          Send the invitation
        </Button>
      </div>
    </form>
  )
}
