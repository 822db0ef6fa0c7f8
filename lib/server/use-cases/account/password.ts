import { hash as argon2Hash, verify } from '@node-rs/argon2'

// Argon2id, 19 MiB, 2 passes, 1 lane: the first choice of OWASP's password storage sheet. 2 is Argon2id in the
// package's enum, which erases under isolated modules.
const cost = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const

export function hashPassword(password: string): Promise<string> {
  return argon2Hash(password, cost)
}

/** Without a hash the same work is done for nothing, so that an unknown account takes as long as a known one. */
export async function checkPassword(hash: string | null, password: string): Promise<boolean> {
  if (hash === null) {
    await hashPassword(password)
    return false
  }
  return verify(hash, password)
}
