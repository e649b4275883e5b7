import { Device } from '../entities/Device.js'
import { Membership } from '../entities/Membership.js'
import { Project } from '../entities/Project.js'
import { Scan } from '../entities/Scan.js'
import type { Work } from '../transaction.js'
import type { NamePosition } from './position.js'

/** The person's membership with its project, a deleted project too. */
export async function membershipOf(work: Work, projectId: string, userId: string): Promise<Membership | null> {
  // One statement: `findOne` with a relation would ask for the ids first.
  const [membership] = await work.find(Membership, { where: { projectId, userId }, relations: { project: true } })
  return membership ?? null
}

export interface ProjectCounts {
  deviceCount: number
  scanCount: number
  lastScanAt: Date | null
  memberCount: number
}

/** Which of a person's projects a list is about. */
export type ProjectSelection = { kind: 'active' | 'archived' } | { kind: 'deleted'; since: Date }

/** The person's memberships with their projects, by the project's name. */
export async function membershipsOf(
  work: Work,
  userId: string,
  selection: ProjectSelection,
  after: NamePosition | null,
  limit: number,
): Promise<{ memberships: Membership[]; total: number }> {
  const query = work
    .createQueryBuilder(Membership, 'membership')
    .innerJoinAndSelect('membership.project', 'project')
    .where('membership.userId = :userId', { userId })
  if (selection.kind === 'deleted') query.andWhere('project.deletedAt > :since', { since: selection.since })
  else
    query.andWhere('project.deletedAt IS NULL AND project.archived = :archived', {
      archived: selection.kind === 'archived',
    })
  const total = await query.getCount()
  if (after) query.andWhere('(project.name > :name OR (project.name = :name AND project.id > :id))', after)
  const memberships = await query.orderBy('project.name').addOrderBy('project.id').take(limit).getMany()
  return { memberships, total }
}

/** What a project holds, for each of the given projects. */
export async function countsOfProjects(work: Work, projectIds: readonly string[]): Promise<Map<string, ProjectCounts>> {
  const counts = new Map<string, ProjectCounts>(
    projectIds.map((id) => [id, { deviceCount: 0, scanCount: 0, lastScanAt: null, memberCount: 0 }]),
  )
  if (projectIds.length === 0) return counts
  const where = 'row.projectId IN (:...projectIds)'
  const devices = await work
    .createQueryBuilder(Device, 'row')
    .select('row.projectId', 'projectId')
    .addSelect('COUNT(*)', 'count')
    .where(`${where} AND row.deletedAt IS NULL`, { projectIds })
    .groupBy('row.projectId')
    .getRawMany<{ projectId: string; count: string }>()
  const scans = await work
    .createQueryBuilder(Scan, 'row')
    .select('row.projectId', 'projectId')
    .addSelect('COUNT(*)', 'count')
    .addSelect('MAX(row.uploadedAt)', 'last')
    .where(`${where} AND row.deletedAt IS NULL`, { projectIds })
    .groupBy('row.projectId')
    .getRawMany<{ projectId: string; count: string; last: Date | null }>()
  const members = await work
    .createQueryBuilder(Membership, 'row')
    .select('row.projectId', 'projectId')
    .addSelect('COUNT(*)', 'count')
    .where(where, { projectIds })
    .groupBy('row.projectId')
    .getRawMany<{ projectId: string; count: string }>()
  for (const row of devices) counts.get(row.projectId)!.deviceCount = Number(row.count)
  for (const row of scans)
    Object.assign(counts.get(row.projectId)!, { scanCount: Number(row.count), lastScanAt: row.last })
  for (const row of members) counts.get(row.projectId)!.memberCount = Number(row.count)
  return counts
}

export async function addProject(work: Work, project: Project): Promise<void> {
  await work.insert(Project, project)
}

export async function saveProject(work: Work, project: Project): Promise<void> {
  await work.save(Project, project)
}

/** The project with a lock on its row until the transaction ends. */
export function lockedProject(work: Work, id: string): Promise<Project | null> {
  return work.findOne(Project, { where: { id }, lock: { mode: 'pessimistic_write' } })
}

export async function saveMembership(
  work: Work,
  membership: Pick<Membership, 'projectId' | 'userId' | 'roles' | 'since'>,
): Promise<void> {
  await work.save(Membership, membership)
}

export async function removeMembership(work: Work, projectId: string, userId: string): Promise<void> {
  await work.delete(Membership, { projectId, userId })
}

/** The members of a project with their people, by name. */
export async function membersOf(
  work: Work,
  projectId: string,
  after: NamePosition | null,
  limit: number,
): Promise<{ members: Membership[]; total: number }> {
  const query = work
    .createQueryBuilder(Membership, 'membership')
    .innerJoinAndSelect('membership.user', 'user')
    .where('membership.projectId = :projectId', { projectId })
  const total = await query.getCount()
  if (after) query.andWhere('(user.name > :name OR (user.name = :name AND user.id > :id))', after)
  return { members: await query.orderBy('user.name').addOrderBy('user.id').take(limit).getMany(), total }
}

/** Everyone's roles in the project, locked so that the last lead cannot leave twice. */
export function lockedMemberships(work: Work, projectId: string): Promise<Membership[]> {
  return work.find(Membership, { where: { projectId }, lock: { mode: 'pessimistic_write' } })
}

export async function projectCountOf(work: Work, userIds: readonly string[]): Promise<Map<string, number>> {
  if (userIds.length === 0) return new Map()
  const rows = await work
    .createQueryBuilder(Membership, 'membership')
    .innerJoin('membership.project', 'project', 'project.deletedAt IS NULL')
    .select('membership.userId', 'userId')
    .addSelect('COUNT(*)', 'count')
    .where('membership.userId IN (:...userIds)', { userIds })
    .groupBy('membership.userId')
    .getRawMany<{ userId: string; count: string }>()
  return new Map(rows.map((row) => [row.userId, Number(row.count)]))
}
