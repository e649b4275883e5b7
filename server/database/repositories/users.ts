import { User } from '../entities/User.js'
import type { Work } from '../transaction.js'
import type { NamePosition } from './position.js'

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

/**
 * One caller at a time, until the transaction ends. The table of people may be empty, and rows that are not there cannot
 * be locked; those of the migrations always are.
 */
export async function lockInstallation(work: Work): Promise<void> {
  await work.query('SELECT id FROM migrations FOR UPDATE')
}

/** By name; names may repeat, so the id decides. */
export async function usersByName(
  work: Work,
  after: NamePosition | null,
  limit: number,
): Promise<{ users: User[]; total: number }> {
  const query = work.createQueryBuilder(User, 'user').orderBy('user.name').addOrderBy('user.id').take(limit)
  if (after) query.where('(user.name > :name OR (user.name = :name AND user.id > :id))', after)
  return { users: await query.getMany(), total: await work.count(User) }
}
