import 'server-only'
import { database } from '@/db'
import { insertAccountEvent } from '@/db/queries/audit'
import { updatePreferences } from '@/db/queries/users'
import type { Preferences, PreferencesChange } from '@/lib/schemas/preferences'
import type { SignedInUser } from './auth'
import { notSignedIn } from './errors'

/**
 * Saves how one person wants to see things. A theme alone leaves no trace in the account’s history: it is switched at
 * every twilight. @throws {AppError} not-signed-in where the account was deleted meanwhile
 */
export function changePreferences(user: SignedInUser, change: PreferencesChange): Promise<Preferences> {
  return database()
    .transaction()
    .execute(async (trx) => {
      const preferences = await updatePreferences(trx, user.id, change)
      if (!preferences) throw notSignedIn()
      if (Object.keys(change).some((key) => key !== 'theme')) {
        await insertAccountEvent(trx, user.id, { action: 'account.preferences', subject: user.email })
      }
      return preferences
    })
}
