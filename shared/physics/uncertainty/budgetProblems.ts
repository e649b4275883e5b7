import { DomainError } from '../errors.js'
import { COMPONENT_KINDS, ERROR_DISTRIBUTIONS } from './budget.js'
import type { BudgetComponent, StandardUncertainty, UncertaintyBudget } from './budget.js'

/** What is wrong with a budget: where (a path such as `components[2].uncertainty.value`) and a sentence. */
export interface BudgetProblem {
  readonly path: string
  readonly message: string
}

/** A relative standard uncertainty above this is taken for a slip of the unit. */
const LARGEST_PERCENT = 50
/** Largest wavelength offset or slit width that is taken for meant, nm. */
const LARGEST_NM = 50

/** Everything that is wrong with a budget, in its order; empty when it can be used. Pure, never throws. */
export function budgetProblems(budget: UncertaintyBudget): BudgetProblem[] {
  const problems: BudgetProblem[] = []
  const seen = new Map<string, number>()
  budget.components.forEach((component, index) => {
    const path = `components[${index}]`
    const earlier = seen.get(component.id)
    if (earlier !== undefined)
      problems.push({
        path: `${path}.id`,
        message: `Components ${earlier + 1} and ${index + 1} are both called "${component.id}"; each needs its own id.`,
      })
    seen.set(component.id, index)
    problems.push(...componentProblems(component, path))
  })
  return problems
}

/** @throws DomainError with the first problem of the budget; its `argument` is the place, after `prefix`. */
export function assertBudget(budget: UncertaintyBudget, prefix = ''): void {
  const first = budgetProblems(budget)[0]
  if (first) throw new DomainError(prefix + first.path, first.message)
}

function componentProblems(component: BudgetComponent, path: string): BudgetProblem[] {
  const name = component.label.trim() || component.id
  const problems: BudgetProblem[] = []
  const report = (field: string, message: string): void => {
    problems.push({ path: `${path}.${field}`, message })
  }
  if (component.id.trim() === '') report('id', 'A component has no id; give it a short name of its own.')
  if (!COMPONENT_KINDS.includes(component.kind))
    report('kind', `${name}: the kind "${component.kind}" is not known; use one of ${COMPONENT_KINDS.join(', ')}.`)
  if (!ERROR_DISTRIBUTIONS.includes(component.distribution))
    report('distribution', `${name}: the distribution must be ${ERROR_DISTRIBUTIONS.join(' or ')}.`)
  const freedom = component.degreesOfFreedom
  if (freedom !== null && !(Number.isFinite(freedom) && freedom > 0))
    report('degreesOfFreedom', `${name}: degrees of freedom are ${freedom}; state a number above zero, or none at all.`)
  if (component.correlatedBetweenJunctions === '')
    report('correlatedBetweenJunctions', `${name}: the group that shares the error has no name.`)
  if (!component.correlatedOverWavelength && component.correlatedBetweenJunctions !== false)
    report(
      'correlatedBetweenJunctions',
      `${name}: an error that differs from point to point cannot be shared between junctions; make it one or the other.`,
    )
  const value = uncertaintyProblem(component, name)
  if (value) problems.push({ path: `${path}.uncertainty${value.path}`, message: value.message })
  return problems
}

function uncertaintyProblem(component: BudgetComponent, name: string): BudgetProblem | null {
  const { kind, uncertainty } = component
  const inNm = kind === 'wavelength-offset' || kind === 'bandwidth'
  if (inNm !== (uncertainty.unit === 'nm'))
    return {
      path: '.unit',
      message: inNm
        ? `${name}: state this uncertainty in nm, not as ${uncertainty.unit}.`
        : `${name}: state this uncertainty in percent or by the scan's own column, not in nm.`,
    }
  if (inNm && !component.correlatedOverWavelength)
    return { path: '', message: `${name}: an error of the wavelength scale moves the whole curve; mark it so.` }
  return magnitudeProblem(uncertainty, name)
}

function magnitudeProblem(uncertainty: StandardUncertainty, name: string): BudgetProblem | null {
  if (uncertainty.unit === 'column') return null
  if (uncertainty.unit === 'percent-table') return tableProblem(uncertainty, name)
  const [unit, largest] = uncertainty.unit === 'nm' ? ['nm', LARGEST_NM] : ['%', LARGEST_PERCENT]
  if (uncertainty.value >= 0 && uncertainty.value <= largest) return null
  return {
    path: '.value',
    message: `${name}: the standard uncertainty is ${uncertainty.value} ${unit}; it must lie between 0 and ${largest} ${unit}.`,
  }
}

function tableProblem(table: StandardUncertainty & { unit: 'percent-table' }, name: string): BudgetProblem | null {
  const { wavelengthNm, percent } = table
  if (wavelengthNm.length !== percent.length || wavelengthNm.length < 2)
    return {
      path: '.percent',
      message: `${name}: the table has ${wavelengthNm.length} wavelengths and ${percent.length} values; it needs two or more pairs.`,
    }
  for (let i = 0; i < percent.length; i++) {
    if (!(wavelengthNm[i]! > (wavelengthNm[i - 1] ?? 0)))
      return {
        path: `.wavelengthNm[${i}]`,
        message: `${name}: wavelength ${i + 1} of the table is ${wavelengthNm[i]} nm; it must be above the one before it.`,
      }
    if (!(percent[i]! >= 0 && percent[i]! <= LARGEST_PERCENT))
      return {
        path: `.percent[${i}]`,
        message: `${name}: at ${wavelengthNm[i]} nm the table says ${percent[i]} %; it must lie between 0 and ${LARGEST_PERCENT} %.`,
      }
  }
  return null
}
