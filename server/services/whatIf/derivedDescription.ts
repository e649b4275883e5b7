import type { OpticalDescription } from '../../../shared/contract/whatIf.js'
import type { OpticalConstantsId } from '../../../shared/data/optical-constants/index.js'
import type { DeviceWithStack, JunctionRow, LayerRow } from '../../database/repositories/devices.js'

/** How materials are called in descriptions, the more particular first. */
const NAMED: readonly (readonly [RegExp, OpticalConstantsId])[] = [
  [/gallium indium phosphide|gainp|ingap/i, 'gainp-schubert-1995'],
  [/indium gallium arsenide|gainas|ingaas/i, 'gainas-adachi-1989'],
  [/gallium arsenide|^\s*gaas\s*$/i, 'gaas-papatryfonos-2021'],
  [/silicon|\bc?-?si\b/i, 'si-green-2008'],
  [/germanium|\bge\b/i, 'ge-nunley-2016'],
  [/\bmgf2\b|magnesium fluoride/i, 'mgf2-rodriguez-de-marcos-2017'],
  [/\bito\b|indium tin oxide/i, 'ito-konig-2014'],
  [/\bag\b|silver/i, 'ag-jiang-2016'],
  [/glass/i, 'soda-lime-low-iron-rubin-1985'],
]
const USUAL_GAP_EV = 1.6
const USUAL_INDEX = 2
const USUAL_THICKNESS_NM = 500
/** Thicker layers than this do not interfere in practice. */
const COHERENT_BELOW_NM = 10_000

interface Derived {
  description: OpticalDescription
  assumptions: string[]
}

/** The optical description that a device's own stack gives, with every assumption as a sentence. Pure. */
export function derivedDescription(device: Pick<DeviceWithStack, 'junctions' | 'layers'>): Derived {
  const assumptions: string[] = []
  const junctions = device.junctions.map((junction, i) => {
    const thicknessNm = junction.thicknessNm ?? device.layers.find((one) => one.junctionIndex === i)?.thicknessNm
    if (!thicknessNm) assumptions.push(`${which(junction)} states no thickness: ${USUAL_THICKNESS_NM} nm is assumed.`)
    return {
      thicknessNm: thicknessNm ?? USUAL_THICKNESS_NM,
      pathFactor: 1,
      absorber: absorberOf(junction, assumptions),
      externalRadiativeEfficiency: 0.001,
    }
  })
  const layers = device.junctions.every((_, i) => device.layers.some((one) => one.junctionIndex === i))
    ? device.layers.flatMap((layer) => layerOf(layer, assumptions))
    : []
  return { description: { junctions, layers }, assumptions }
}

const which = ({ position, label }: JunctionRow) => `Junction ${position} (${label})`
const materialNamed = (text: string) => NAMED.find(([words]) => words.test(text))?.[1]

function absorberOf(junction: JunctionRow, assumptions: string[]) {
  const material = materialNamed(junction.absorber)
  if (material) return { material }
  const bandGapEv = junction.nominalGapEv ?? USUAL_GAP_EV
  assumptions.push(
    `${which(junction)} absorbs by a direct edge at ${bandGapEv} eV with 150 000 cm⁻¹ and a tail of 15 meV.`,
  )
  return { bandGapEv, alpha0PerCm: 150_000, urbachMev: 15 }
}

function layerOf(layer: LayerRow, assumptions: string[]): OpticalDescription['layers'] {
  const coherent = (layer.thicknessNm ?? 0) < COHERENT_BELOW_NM
  if (layer.junctionIndex !== null) return [{ junction: layer.junctionIndex + 1, coherent }]
  if (layer.thicknessNm === null) {
    assumptions.push(`The layer ${layer.name} states no thickness and is left out.`)
    return []
  }
  const material = materialNamed(layer.material)
  if (!material) assumptions.push(`The layer ${layer.name} is taken as clear with an index of ${USUAL_INDEX}.`)
  return [{ name: layer.name, thicknessNm: layer.thicknessNm, material: material ?? USUAL_INDEX, coherent }]
}
