import 'server-only'
import { hash, verify } from '@node-rs/argon2'

/** The package's defaults are argon2id with 19 MiB, 2 passes, 1 lane: the OWASP Password Storage Cheat Sheet's choice. */
export function hashPassword(password: string): Promise<string> {
  return hash(password.normalize('NFC'))
}

let decoy: Promise<string> | undefined

/** Takes as long for an account that does not exist (hash undefined) as for a wrong password. */
export async function isPasswordRight(passwordHash: string | undefined, password: string): Promise<boolean> {
  decoy ??= hashPassword('no account has this password')
  const isRight = await verify(passwordHash ?? (await decoy), password.normalize('NFC'))
  return passwordHash !== undefined && isRight
}
