import type { Material } from '../../../shared/contract/materials.js'
import { OPTICAL_CONSTANT_IDS, OPTICAL_CONSTANTS } from '../../../shared/data/optical-constants/index.js'
import { LIBRARY_GAPS_EV } from '../../../shared/physics/whatIf/index.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'

export async function listMaterials(
  { work }: Database,
  actor: Actor,
  projectId: string,
): Promise<{ items: Material[] }> {
  await requireMember(work, actor, projectId, 'read')
  return {
    items: OPTICAL_CONSTANT_IDS.map((id) => {
      const { name, reference, caveat, wavelengthNm, n, k } = OPTICAL_CONSTANTS[id]
      const bandGapEv = LIBRARY_GAPS_EV[id] ?? null
      return { id, name, source: reference, caveat, bandGapEv, wavelengthNm: [...wavelengthNm], n: [...n], k: [...k] }
    }),
  }
}
