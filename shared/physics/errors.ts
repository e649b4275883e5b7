/**
 * An argument lies outside the domain of a function. `argument` names it; the message is a sentence that says what
 * is wrong, where, and what would be right. The engine throws nothing else on purpose.
 */
export class DomainError extends RangeError {
  override readonly name = 'DomainError'

  constructor(
    readonly argument: string,
    message: string,
  ) {
    super(message)
  }
}

/** Throws unless `value` is a finite number. NaN fails. */
export function assertFinite(value: number, argument: string): void {
  if (!Number.isFinite(value)) throw new DomainError(argument, `${argument} is ${value}; it must be a finite number.`)
}

/** Throws unless `value` is finite and above zero. */
export function assertPositive(value: number, argument: string): void {
  if (!(value > 0) || !Number.isFinite(value))
    throw new DomainError(argument, `${argument} is ${value}; it must be a number above zero.`)
}

/** Throws unless `value` is finite and zero or above. */
export function assertNotNegative(value: number, argument: string): void {
  if (!(value >= 0) || !Number.isFinite(value))
    throw new DomainError(argument, `${argument} is ${value}; it must be zero or a number above zero.`)
}

/** Throws unless `low <= value <= high`. */
export function assertWithin(value: number, low: number, high: number, argument: string): void {
  if (!(value >= low && value <= high))
    throw new DomainError(argument, `${argument} is ${value}; it must lie between ${low} and ${high}.`)
}
