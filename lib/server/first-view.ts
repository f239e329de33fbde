import 'server-only'
import { Refusal } from '@/db/queries/refusal'

/**
 * What a list's page is sent with, or nothing where its address leads to no place in the list: the browser then asks
 * itself and says what is wrong.
 */
export async function firstView<T>(pending: Promise<T>): Promise<T | undefined> {
  try {
    return await pending
  } catch (error) {
    if (error instanceof Refusal && error.reason.kind === 'not-valid') return undefined
    throw error
  }
}
