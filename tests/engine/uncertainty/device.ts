import { makeCurve } from '../../../shared/physics/curve.js'
import type { Curve } from '../../../shared/physics/curve.js'
import { makeSpectrum } from '../../../shared/physics/spectrum.js'
import type { Spectrum } from '../../../shared/physics/spectrum.js'
import type { BudgetComponent, MeasuredJunction } from '../../../shared/physics/uncertainty/index.js'

/** A made-up sun: black-body-like irradiance with lines and bands as sharp as the real table's, 0.5 to 5 nm steps. */
export function stripedSun(): Spectrum {
  const nm: number[] = []
  for (let x = 280; x < 400; x += 0.5) nm.push(x)
  for (let x = 400; x < 1700; x += 1) nm.push(x)
  for (let x = 1705; x <= 2000; x += 5) nm.push(x)
  const values = nm.map((x) => {
    const rising = 1 / (1 + Math.exp((400 - x) / 40))
    const bands = 1 - 0.7 * Math.exp(-(((x - 940) / 18) ** 2)) - 0.5 * Math.exp(-(((x - 761) / 2) ** 2))
    return 1.6 * rising * Math.exp(-(x - 280) / 800) * bands * (1 + 0.06 * Math.sin(2.1 * x) * Math.sin(0.37 * x))
  })
  return makeSpectrum({ id: 'striped', name: 'Striped sun', curve: makeCurve(nm, values) })
}

/** A smooth response between two edges, each with a width, from 300 nm on. */
export function band(fromNm: number, toNm: number, height: number, points = 300, lastNm = 1200): Curve {
  const nm = Array.from({ length: points }, (_, k) => 300 + ((lastNm - 300) * k) / (points - 1))
  const edge = (x: number): number => 1 / (1 + Math.exp(-x))
  return makeCurve(
    nm,
    nm.map((x) => height * edge((x - fromNm) / 12) * edge((toNm - x) / 9)),
  )
}

export function component(change: Partial<BudgetComponent> & Pick<BudgetComponent, 'id'>): BudgetComponent {
  return {
    kind: 'custom',
    label: change.id,
    uncertainty: { unit: 'percent', value: 1 },
    correlatedOverWavelength: true,
    correlatedBetweenJunctions: true,
    degreesOfFreedom: null,
    distribution: 'normal',
    source: 'test',
    ...change,
  }
}

/** A budget with every kind of error in it. */
export const fullBudget: readonly BudgetComponent[] = [
  component({ id: 'detector', kind: 'detector-calibration', correlatedBetweenJunctions: 'detector A, range 1' }),
  component({ id: 'area', kind: 'area', uncertainty: { unit: 'percent', value: 0.5 } }),
  component({
    id: 'drift',
    kind: 'drift-gain',
    uncertainty: { unit: 'percent', value: 0.3 },
    correlatedBetweenJunctions: false,
    degreesOfFreedom: 9,
  }),
  component({
    id: 'noise',
    kind: 'noise',
    uncertainty: { unit: 'column' },
    correlatedOverWavelength: false,
    correlatedBetweenJunctions: false,
  }),
  component({
    id: 'offset',
    kind: 'wavelength-offset',
    uncertainty: { unit: 'nm', value: 0.5 },
    distribution: 'rectangular',
  }),
  component({ id: 'slit', kind: 'bandwidth', uncertainty: { unit: 'nm', value: 5 } }),
  component({
    id: 'bias',
    kind: 'bias-residual',
    uncertainty: { unit: 'percent-table', wavelengthNm: [300, 600, 1200], percent: [1, 0.2, 0.6] },
    correlatedBetweenJunctions: false,
  }),
]

export function measured(eqe: Curve, components: readonly BudgetComponent[] = fullBudget): MeasuredJunction {
  return { eqe, pointUncertainty: eqe.values.map(() => 0.004), components }
}

/** Two junctions of a tandem. `gapNm` moves the border between them and so the mismatch. */
export function tandem(gapNm = 770, components: readonly BudgetComponent[] = fullBudget): MeasuredJunction[] {
  return [measured(band(310, gapNm, 0.88), components), measured(band(gapNm, 1120, 0.93), components)]
}
