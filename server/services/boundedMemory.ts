/** Keeps what was worked out last, at most `size` of it; what was not asked for longest makes room. */
export class BoundedMemory<Value> {
  readonly #values = new Map<string, Value>()

  constructor(private readonly size: number) {}

  get(key: string): Value | undefined {
    const value = this.#values.get(key)
    if (value !== undefined) this.keep(key, value)
    return value
  }

  keep(key: string, value: Value): Value {
    this.#values.delete(key)
    this.#values.set(key, value)
    if (this.#values.size > this.size) this.#values.delete(this.#values.keys().next().value!)
    return value
  }
}
