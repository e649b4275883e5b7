import type { ThresholdSettings } from '../../../shared/physics/checks/index.js'
import { ProjectThresholds } from '../entities/ProjectThresholds.js'
import type { Work } from '../transaction.js'

export async function thresholdSettings(work: Work, projectId: string): Promise<ThresholdSettings> {
  return (await work.findOneBy(ProjectThresholds, { projectId }))?.settings ?? {}
}

/** Version zero while nothing was changed. */
export async function thresholdsOfProject(
  work: Work,
  projectId: string,
): Promise<Pick<ProjectThresholds, 'settings' | 'version'>> {
  return (await work.findOneBy(ProjectThresholds, { projectId })) ?? { settings: {}, version: 0 }
}

export async function saveThresholds(work: Work, row: Omit<ProjectThresholds, 'project'>): Promise<void> {
  await work.upsert(ProjectThresholds, row, ['projectId'])
}
