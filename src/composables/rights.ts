import { computed, type MaybeRefOrGetter } from 'vue'
import { hasRight, type Right } from '../../shared/contract/rights.js'
import { useProject } from './projects.js'

/** What the reader may do in a project; nothing while it is not known. The server decides again in any case. */
export function useRights(projectId: MaybeRefOrGetter<string>) {
  const project = useProject(projectId)
  const roles = computed(() => project.data.value?.myRoles ?? [])
  const isArchived = computed(() => project.data.value?.archived === true)
  /** Whether a role of the reader allows it. In an archived project only reading and managing go on. */
  function can(right: Right): boolean {
    if (isArchived.value && right !== 'read' && right !== 'manage-project') return false
    return hasRight(roles.value, right)
  }
  return { roles, isArchived, can }
}
