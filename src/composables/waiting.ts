import { useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { Project } from '../../shared/contract/projects.js'
import { hasRight } from '../../shared/contract/rights.js'
import type { Scan, SourceFile } from '../../shared/contract/scans.js'
import * as api from '../api/scans.js'
import { queryKeys } from './queryKeys.js'

/** What someone who measures still has to do in one project. */
export interface Waiting {
  project: Project
  /** Uploaded, but no column has been confirmed yet. */
  unconfirmed: SourceFile[]
  /** Scans with a caution or a reject that nobody has decided on. */
  undecided: Scan[]
}

const LOOKED_AT = 12
const NEWEST = 100

/** What waits for the reader, over the projects in which they may act on scans. */
export function useWaiting(projects: MaybeRefOrGetter<readonly Project[]>) {
  const mine = computed(() =>
    toValue(projects)
      .filter((project) => hasRight(project.myRoles, 'edit-scans') && !project.archived)
      .slice(0, LOOKED_AT),
  )
  return useQuery({
    queryKey: computed(() => queryKeys.waiting(mine.value.map((project) => project.id))),
    queryFn: async ({ signal }) => {
      const all = await Promise.all(mine.value.map((project) => waitingIn(project, signal)))
      return all.filter((one) => one.unconfirmed.length + one.undecided.length > 0)
    },
    enabled: () => mine.value.length > 0,
  })
}

async function waitingIn(project: Project, signal: AbortSignal): Promise<Waiting> {
  const [files, scans] = await Promise.all([
    api.listSourceFiles(project.id, { state: 'uploaded', limit: NEWEST }, signal),
    project.scanCount > 0 ? api.listScans(project.id, { limit: NEWEST }, signal) : { items: [] },
  ])
  const undecided = scans.items.filter(
    (scan) => scan.state === 'checked' && (scan.worstFinding === 'caution' || scan.worstFinding === 'reject'),
  )
  return { project, unconfirmed: files.items, undecided }
}
