import type { Metadata } from 'next'
import { AccountScreen } from '@/components/account/account-screen'
import { requirePageUser } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Account' }

export default async function AccountPage() {
  const { displayName, email } = await requirePageUser('/account')
  return <AccountScreen user={{ displayName, email }} />
}
