import type { MaterialLibrary, OpticalConstants } from '../absorption/index.js'
import type { Curve } from '../curve.js'

/** What absorbs in a junction: a material of the library, the parametric edge, or a table of its own. */
export type AbsorberModel =
  | { readonly material: string }
  | {
      readonly bandGapEv: number
      readonly alpha0PerCm: number
      readonly urbachMev: number
      /** n for the transfer matrix: a number or the material whose n is taken. Default 2.4. */
      readonly refractiveIndex?: number | { readonly material: string }
    }
  | OpticalConstants

/** The diode of a junction, for the estimate of voltage and power. */
export interface DiodeModel {
  /** n. Default 1. */
  readonly ideality?: number
  /** J_0 of the measured device, mA cm⁻². Default: the detailed-balance value of the gap over the radiative share. */
  readonly darkCurrentMaCm2?: number
  /** External radiative efficiency, fraction, used where J_0 is not given. Default 0.001. */
  readonly externalRadiativeEfficiency?: number
}

/** One junction as it was measured. */
export interface JunctionModel {
  readonly thicknessNm: number
  /** m of Beer–Lambert. Default 1. */
  readonly pathFactor?: number
  readonly absorber: AbsorberModel
  /** E_g, eV, where the absorber does not state it. Only differences enter: the shift is rigid. */
  readonly bandGapEv?: number
  /**
   * How far the absorber's edge lies from the one of its model already, eV, where the device is itself the result of a
   * shifted gap. Default 0. The stated gap is then the model's plus this shift.
   */
  readonly gapShiftEv?: number
  readonly diode?: DiodeModel
}

/** A layer for the transfer matrix: a coating, contact or glass, or the absorber of a junction (counted from 1). */
export type LayerModel =
  | {
      readonly name: string
      readonly thicknessNm: number
      /** A material of the library, or an index without absorption. */
      readonly material: string | number
      /** False for a layer too thick to interfere. Default true. */
      readonly coherent?: boolean
    }
  | { readonly junction: number; readonly coherent?: boolean }

/** A device as it was measured: junctions from the sunward side, and the layers where the transfer matrix is asked. */
export interface DeviceModel {
  readonly junctions: readonly JunctionModel[]
  readonly layers?: readonly LayerModel[]
  /** Index of the medium the light comes from. Default 1. */
  readonly incidentIndex?: number
  /** Half-space behind: a material or an index. Default 1 (air). */
  readonly exit?: string | number
  readonly angleDeg?: number
  readonly seriesResistanceOhmCm2?: number
}

export type OpticalModelName = 'beer-lambert' | 'transfer-matrix'

/** Below these absorptances EQE/A means nothing and the collection efficiency is continued instead. */
export interface ContinuationLimits {
  /** Share of the light reaching the junction that it absorbs itself. Default 0.01. */
  readonly ownShare?: number
  /** Absorptance of the junction, of all light on the device. Default 0.001. */
  readonly absorptance?: number
}

export interface WhatIfInput {
  readonly device: DeviceModel
  /** Measured EQE of each junction, fraction, on its own wavelengths. */
  readonly eqe: readonly Curve[]
  /** Spectral irradiance, W m⁻² nm⁻¹. */
  readonly spectrum: Curve
  readonly materials: MaterialLibrary
  readonly model?: OpticalModelName
  /** K. Default 298.15. */
  readonly temperatureK?: number
  readonly continuation?: ContinuationLimits
  /**
   * What to do at wavelengths of a scan where a material is not known: refuse (default), or keep the measured EQE there as
   * it is and tell which wavelengths that were. Nothing is extrapolated either way.
   */
  readonly outsideMaterials?: 'refuse' | 'keep-measured'
}

/**
 * Changed values by key, in the unit that the key names: `1.thicknessNm`, `1.bandGapEv`, `1.gapShiftEv`,
 * `2.pathFactor` (junctions count from 1, sunward first), `layer.NAME.thicknessNm`. What is absent stays as measured.
 */
export type Change = Readonly<Record<string, number>>

/** Band gaps of the library's absorbers at 300 K, eV; common textbook values. Only differences are computed with. */
export const LIBRARY_GAPS_EV: Readonly<Record<string, number>> = {
  'si-green-2008': 1.12,
  'gaas-papatryfonos-2021': 1.42,
  'gainp-schubert-1995': 1.85,
  'ge-nunley-2016': 0.66,
  'gainas-adachi-1989': 0.75,
  'ch3nh3pbi3-phillips-2015': 1.6,
}

/** The gap that a junction states, or that its material is known for; undefined when neither. */
export function statedGapEv(junction: JunctionModel): number | undefined {
  if (junction.bandGapEv !== undefined) return junction.bandGapEv
  const { absorber, gapShiftEv = 0 } = junction
  if ('bandGapEv' in absorber) return absorber.bandGapEv + gapShiftEv
  const gap = 'material' in absorber ? LIBRARY_GAPS_EV[absorber.material] : undefined
  return gap === undefined ? undefined : gap + gapShiftEv
}
