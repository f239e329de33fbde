import 'server-only'
import { AppError } from './errors'

/** Lets so many pieces of work run at once in this process; what comes beyond is put off, since each needs much memory. */
export function createGate(most: number, busyMessage: string) {
  let running = 0
  return async function enter<T>(work: () => Promise<T>): Promise<T> {
    if (running >= most) throw new AppError('busy', busyMessage, { retryAfterSeconds: 10 })
    running += 1
    try {
      return await work()
    } finally {
      running -= 1
    }
  }
}
