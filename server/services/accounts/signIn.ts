import type { User } from '../../database/entities/User.js'
import { noteSignIn, userByEmail, userById } from '../../database/repositories/users.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { isPassword } from '../passwords.js'

/** The person behind an address and password; null takes as long whether or not the address is known. */
export async function actorBySignIn(database: Database, email: string, password: string): Promise<Actor | null> {
  const user = await userByEmail(database.work, email.trim().toLowerCase())
  const right = await isPassword(user?.passwordHash, password)
  if (!user || !right || user.disabled) return null
  await noteSignIn(database.work, user.id, new Date())
  return actorOf(user)
}

/** The person of a session; null once the account is disabled. */
export async function actorById(database: Database, id: string): Promise<Actor | null> {
  const user = await userById(database.work, id)
  return user && !user.disabled ? actorOf(user) : null
}

export function actorOf(user: User): Actor {
  return { personId: user.id, name: user.name, email: user.email, isAdministrator: user.isAdministrator }
}
