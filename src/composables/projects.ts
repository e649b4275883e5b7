import { useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { createProject, updateProject } from '../../shared/contract/projects.js'
import type { BodySent } from '../../shared/contract/route.js'
import { everyItem } from '../api/pages.js'
import * as api from '../api/projects.js'
import { useChange } from './change.js'
import { queryKeys } from './queryKeys.js'
import { useRefresh } from './refresh.js'

export type ProjectSelection = 'active' | 'archived' | 'deleted'

/** The reader's projects. */
export function useProjects(include: MaybeRefOrGetter<ProjectSelection> = 'active') {
  return useQuery({
    queryKey: computed(() => queryKeys.projectList(toValue(include))),
    queryFn: ({ signal }) =>
      everyItem((cursor) => api.listProjects({ include: toValue(include), cursor, limit: 200 }, signal)),
  })
}

export function useProject(projectId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.projectItself(toValue(projectId))),
    queryFn: ({ signal }) => api.readProject(toValue(projectId), signal),
    enabled: () => toValue(projectId) !== '',
  })
}

export function useCreateProject() {
  const refresh = useRefresh()
  return useChange(
    (body: BodySent<typeof createProject>) => api.createProject(body),
    () => refresh.projects(),
  )
}

export function useUpdateProject(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (body: BodySent<typeof updateProject>) => api.updateProject(toValue(projectId), body),
    () => refresh.project(toValue(projectId)),
  )
}

export function useDeleteProject() {
  const refresh = useRefresh()
  return useChange(api.deleteProject, () => refresh.projects())
}

export function useRestoreProject() {
  const refresh = useRefresh()
  return useChange(api.restoreProject, (project) => refresh.project(project.id))
}
