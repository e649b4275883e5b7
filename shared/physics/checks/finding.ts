export type Severity = 'note' | 'caution' | 'reject'

/** A number that made a check fire, with its unit ('' for a pure number). */
export interface FindingNumber {
  readonly value: number
  readonly unit: string
}

/** What a check found: what fired, the numbers, where in wavelength, and what to do at the bench. */
export interface Finding {
  /** Name of the check in the registry. */
  readonly check: string
  readonly title: string
  readonly severity: Severity
  readonly message: string
  readonly advice: string
  /** Wavelengths concerned, from and to, nm; empty when the finding is not about wavelengths. */
  readonly bandsNm: readonly (readonly [number, number])[]
  readonly numbers: Readonly<Record<string, FindingNumber>>
}

/** A check that lacks an input says so; it never counts as passed. */
export type CheckOutcome =
  | { readonly outcome: 'passed' }
  | { readonly outcome: 'not-checked'; readonly reason: string }
  | { readonly outcome: 'fired'; readonly finding: Finding }
