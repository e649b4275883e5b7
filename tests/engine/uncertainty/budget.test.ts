import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../shared/physics/errors.js'
import {
  assertBudget,
  budgetProblems,
  COMPONENT_KINDS,
  mergeBudgets,
  TYPICAL_COMPONENTS,
} from '../../../shared/physics/uncertainty/index.js'
import type { BudgetComponent } from '../../../shared/physics/uncertainty/index.js'
import { component, fullBudget } from './device.js'

describe('merging budgets', () => {
  const project = { components: [component({ id: 'area' }), component({ id: 'detector', source: 'project' })] }
  const setUp = { components: [component({ id: 'detector', source: 'set-up' }), component({ id: 'gain' })] }
  const scan = { components: [component({ id: 'gain', uncertainty: { unit: 'percent', value: 0 } })] }

  it('lets the statement nearest to the scan win, component by component', () => {
    const merged = mergeBudgets({ project, setUp, scan })
    expect(merged.map(({ id, origin }) => [id, origin])).toEqual([
      ['area', 'project'],
      ['detector', 'set-up'],
      ['gain', 'scan'],
    ])
    expect(merged[1]!.source).toBe('set-up')
    expect(merged[2]!.uncertainty).toEqual({ unit: 'percent', value: 0 })
  })

  it('is empty when nothing was stated and does not change its inputs', () => {
    expect(mergeBudgets({ project: null, setUp: null, scan: null })).toEqual([])
    const before = JSON.stringify(project)
    mergeBudgets({ project, setUp, scan })
    expect(JSON.stringify(project)).toBe(before)
  })

  it('survives a round trip through JSON', () => {
    expect(JSON.parse(JSON.stringify({ components: fullBudget }))).toEqual({ components: fullBudget })
  })
})

describe('typical components', () => {
  it('are valid, have one of each kind but custom, and name common practice where a range is offered', () => {
    const components = TYPICAL_COMPONENTS.map((typical) => typical.component)
    expect(budgetProblems({ components })).toEqual([])
    expect(components.map(({ kind }) => kind)).toEqual(COMPONENT_KINDS.filter((kind) => kind !== 'custom'))
    for (const { component: offered, usualRange } of TYPICAL_COMPONENTS) {
      if (usualRange === null || !('value' in offered.uncertainty)) continue
      expect(offered.source).toContain('Common practice')
      expect(offered.uncertainty.value).toBeGreaterThanOrEqual(usualRange[0])
      expect(offered.uncertainty.value).toBeLessThanOrEqual(usualRange[1])
    }
  })
})

describe('what is wrong with a budget', () => {
  const table = (wavelengthNm: number[], percent: number[]): BudgetComponent['uncertainty'] => ({
    unit: 'percent-table',
    wavelengthNm,
    percent,
  })

  it.each<[string, Partial<BudgetComponent>, string, string]>([
    ['no id', { id: ' ' }, 'id', 'no id'],
    ['an unknown kind', { kind: 'gremlin' as BudgetComponent['kind'] }, 'kind', '"gremlin" is not known'],
    ['a negative value', { uncertainty: { unit: 'percent', value: -1 } }, 'uncertainty.value', '-1 %'],
    ['NaN', { uncertainty: { unit: 'percent', value: NaN } }, 'uncertainty.value', 'between 0 and 50 %'],
    ['an offset in percent', { kind: 'wavelength-offset' }, 'uncertainty.unit', 'state this uncertainty in nm'],
    ['a gain in nm', { kind: 'drift-gain', uncertainty: { unit: 'nm', value: 1 } }, 'uncertainty.unit', 'not in nm'],
    ['zero degrees of freedom', { degreesOfFreedom: 0 }, 'degreesOfFreedom', 'above zero'],
    ['a nameless group', { correlatedBetweenJunctions: '' }, 'correlatedBetweenJunctions', 'no name'],
    ['shared point errors', { correlatedOverWavelength: false }, 'correlatedBetweenJunctions', 'from point to point'],
    [
      'a table of unequal length',
      { uncertainty: table([400, 500], [1]) },
      'uncertainty.percent',
      '2 wavelengths and 1 values',
    ],
    ['a falling table', { uncertainty: table([500, 400], [1, 1]) }, 'uncertainty.wavelengthNm[1]', '400 nm'],
    ['a huge table value', { uncertainty: table([400, 500], [1, 90]) }, 'uncertainty.percent[1]', 'at 500 nm'],
    [
      'a strange distribution',
      { distribution: 'lumpy' as BudgetComponent['distribution'] },
      'distribution',
      'rectangular',
    ],
  ])('%s is reported with its place and a sentence', (_, change, path, words) => {
    const problems = budgetProblems({ components: [component({ id: 'x', ...change })] })
    expect(problems).toHaveLength(1)
    expect(problems[0]!.path).toBe(`components[0].${path}`)
    expect(problems[0]!.message).toContain(words)
  })

  it('two components of one id are reported at the second', () => {
    const components = [component({ id: 'area' }), component({ id: 'area' })]
    expect(budgetProblems({ components })).toEqual([
      { path: 'components[1].id', message: 'Components 1 and 2 are both called "area"; each needs its own id.' },
    ])
    expect(() => assertBudget({ components })).toThrow(DomainError)
  })

  it('nothing is reported for a budget with every kind of error', () => {
    expect(budgetProblems({ components: fullBudget })).toEqual([])
  })
})
