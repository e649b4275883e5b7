/** What an error of the measurement comes from. `custom` is anything else the laboratory knows of. */
export const COMPONENT_KINDS = [
  'detector-calibration',
  'area',
  'drift-gain',
  'noise',
  'wavelength-offset',
  'bandwidth',
  'bias-residual',
  'spectrum',
  'custom',
] as const
export type ComponentKind = (typeof COMPONENT_KINDS)[number]

/** Shape of the distribution that the Monte Carlo draws from; its standard deviation is the standard uncertainty. */
export const ERROR_DISTRIBUTIONS = ['normal', 'rectangular'] as const
export type ErrorDistribution = (typeof ERROR_DISTRIBUTIONS)[number]

/**
 * One standard uncertainty (k = 1):
 * `percent` of the EQE at every wavelength; `percent-table` the same, linear between the wavelengths given and constant
 * beyond them; `nm` a wavelength offset, or for `bandwidth` the full width at half maximum of a triangular slit
 * function, the whole effect of which counts as one standard uncertainty; `column` the scan's own values, point by
 * point, in EQE.
 */
export type StandardUncertainty =
  | { readonly unit: 'percent'; readonly value: number }
  | { readonly unit: 'percent-table'; readonly wavelengthNm: readonly number[]; readonly percent: readonly number[] }
  | { readonly unit: 'nm'; readonly value: number }
  | { readonly unit: 'column' }

/** One line of an uncertainty budget. It can be kept as JSON. */
export interface BudgetComponent {
  /** Names the component within the project; budgets nearer to the scan replace the component of the same id. */
  readonly id: string
  readonly kind: ComponentKind
  readonly label: string
  readonly uncertainty: StandardUncertainty
  /** One error moves the whole curve (true), or every point has its own (false). */
  readonly correlatedOverWavelength: boolean
  /**
   * true: all junctions of the device share one error. false: each has its own. A text: those junctions share it whose
   * component of this id carries the same text, e.g. "detector Si-2, range 1".
   */
  readonly correlatedBetweenJunctions: boolean | string
  /** null: infinitely many, the uncertainty itself is taken as known. */
  readonly degreesOfFreedom: number | null
  readonly distribution: ErrorDistribution
  /** Where the figure comes from: certificate, repeat scans, judgement. */
  readonly source: string
}

/** The components stated at one place: a project, a measurement set-up or a scan. */
export interface UncertaintyBudget {
  readonly components: readonly BudgetComponent[]
}

/** Where a component of a merged budget was stated. */
export type BudgetOrigin = 'project' | 'set-up' | 'scan'

/** A component that applies to one scan, with the place that stated it. */
export interface EffectiveComponent extends BudgetComponent {
  readonly origin: BudgetOrigin
}

/** The budgets that may apply to a scan; null where nothing was stated. */
export interface BudgetLevels {
  readonly project: UncertaintyBudget | null
  readonly setUp: UncertaintyBudget | null
  readonly scan: UncertaintyBudget | null
}

/**
 * The budget that applies to one scan: for each component id the statement nearest to the scan wins, whole (scan before
 * set-up before project). A component stated as 0 is thereby switched off. Order: as first stated, from the project on.
 */
export function mergeBudgets(levels: BudgetLevels): EffectiveComponent[] {
  const merged = new Map<string, EffectiveComponent>()
  const add = (budget: UncertaintyBudget | null, origin: BudgetOrigin): void => {
    for (const component of budget?.components ?? []) merged.set(component.id, { ...component, origin })
  }
  add(levels.project, 'project')
  add(levels.setUp, 'set-up')
  add(levels.scan, 'scan')
  return [...merged.values()]
}

/** A component with the range of standard uncertainties that laboratories commonly state for it. */
export interface TypicalComponent {
  readonly component: BudgetComponent
  /** Lowest and highest usual value in the component's own unit; null where it comes from the data. */
  readonly usualRange: readonly [number, number] | null
}

const COMMON_PRACTICE = 'Common practice; replace it by your own figure.'

const typical = (
  kind: ComponentKind,
  label: string,
  uncertainty: StandardUncertainty,
  correlation: readonly [overWavelength: boolean, betweenJunctions: boolean | string],
  usualRange: readonly [number, number] | null,
  source = COMMON_PRACTICE,
): TypicalComponent => ({
  component: {
    id: kind,
    kind,
    label,
    uncertainty,
    correlatedOverWavelength: correlation[0],
    correlatedBetweenJunctions: correlation[1],
    degreesOfFreedom: null,
    distribution: kind === 'wavelength-offset' ? 'rectangular' : 'normal',
    source,
  },
  usualRange,
})

/**
 * Typical components to start a budget from. The ranges are common practice, not a standard: they are offered beside
 * the field and marked so, never put into a budget unasked.
 */
export const TYPICAL_COMPONENTS: readonly TypicalComponent[] = [
  typical(
    'detector-calibration',
    'Reference detector calibration',
    { unit: 'percent', value: 1 },
    [true, 'same detector and range'],
    [0.5, 1.5],
  ),
  typical('area', 'Illuminated or device area', { unit: 'percent', value: 0.5 }, [true, true], [0.2, 1]),
  typical('drift-gain', 'Monitor drift and amplifier gain', { unit: 'percent', value: 0.3 }, [true, false], [0.1, 0.5]),
  typical('noise', 'Noise', { unit: 'column' }, [false, false], null, 'Repeat scans, or the column of the file.'),
  typical('wavelength-offset', 'Wavelength offset', { unit: 'nm', value: 0.5 }, [true, true], [0.2, 1]),
  typical(
    'bandwidth',
    'Bandwidth',
    { unit: 'nm', value: 5 },
    [true, true],
    null,
    'Full width at half maximum from the slit width; the figure offered is common practice.',
  ),
  typical(
    'bias-residual',
    'Bias light and bias voltage residual',
    { unit: 'percent', value: 0 },
    [true, false],
    null,
    'The leakage that the checks of the scan estimate; 0 until there is an estimate.',
  ),
  typical(
    'spectrum',
    'Spectrum',
    { unit: 'percent', value: 0 },
    [true, true],
    null,
    'None for a tabulated reference spectrum; the calibration of the spectroradiometer for a measured one.',
  ),
]
