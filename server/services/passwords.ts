import { hash, verify } from '@node-rs/argon2'

/** Argon2id with the parameters of RFC 9106's second recommendation (64 MiB, 3 passes), one lane. */
const OPTIONS = { memoryCost: 65_536, timeCost: 3, parallelism: 1 }

/** Hash of a password that nobody has: verifying against it takes as long as against a real one. */
const NOBODY = hash('a password that nobody has', OPTIONS)

export function hashPassword(password: string): Promise<string> {
  return hash(password, OPTIONS)
}

/** Whether the password is right; without a hash it takes the same time and is false. */
export async function isPassword(passwordHash: string | null | undefined, password: string): Promise<boolean> {
  const right = await verify(passwordHash ?? (await NOBODY), password)
  return right && Boolean(passwordHash)
}
