import { hash, verify } from '@node-rs/argon2'
import { createHash, randomBytes } from 'node:crypto'

/** argon2id with the parameters of the OWASP Password Storage Cheat Sheet: 19 MiB, two passes, one lane. */
const ARGON2ID = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const

// RFC 8265 prepares passwords in form C, so that a keyboard that composes letters differently still signs in.
export const hashPassword = (password: string): Promise<string> => hash(password.normalize('NFC'), ARGON2ID)

let nobodysHash: Promise<string> | undefined

/** For an unknown address a hash is checked all the same, so that the answer takes as long as for a known one. */
export async function passwordMatches(passwordHash: string | null, password: string): Promise<boolean> {
  nobodysHash ??= hashPassword(randomBytes(24).toString('base64url'))
  const matches = await verify(passwordHash ?? (await nobodysHash), password.normalize('NFC'))
  return matches && passwordHash !== null
}

/** 256 random bits for a mail link. */
export const newToken = (): string => randomBytes(32).toString('base64url')

export const sha256 = (value: string): Buffer => createHash('sha256').update(value).digest()
