import { User } from '../entities/User.js'
import type { Work } from '../transaction.js'

export function userById(work: Work, id: string): Promise<User | null> {
  return work.findOneBy(User, { id })
}

export function userByEmail(work: Work, email: string): Promise<User | null> {
  return work.findOneBy(User, { email })
}

export async function addUser(work: Work, user: User): Promise<void> {
  await work.insert(User, user)
}

export async function saveUser(work: Work, user: User): Promise<void> {
  await work.save(User, user)
}

export async function noteSignIn(work: Work, id: string, at: Date): Promise<void> {
  await work.update(User, { id }, { lastSignInAt: at })
}

export function numberOfUsers(work: Work): Promise<number> {
  return work.count(User)
}

/** Administrators who can sign in, locked until the transaction ends so that the last one cannot vanish twice. */
export function activeAdministrators(work: Work): Promise<User[]> {
  return work.find(User, { where: { isAdministrator: true, disabled: false }, lock: { mode: 'pessimistic_write' } })
}
