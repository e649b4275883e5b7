import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import { fieldErrorsOf, sentenceOf } from '../errors/sentences.js'

/** Spreads an error over a form: sentences at the fields they speak of, the rest above the form. */
export function useFormErrors(error: MaybeRefOrGetter<unknown>) {
  const fields = computed(() => fieldErrorsOf(toValue(error)))
  const places = new Set<string>()
  function at(...path: (string | number)[]): string[] {
    const place = path.join('.')
    places.add(place)
    return fields.value.filter((field) => field.path.join('.') === place).map((field) => field.message)
  }
  /** The sentence for the whole form; null when all that it says stands at fields. */
  const summary = computed(() => {
    const value = toValue(error)
    if (value === null || value === undefined) return null
    const isAtFields = fields.value.length > 0 && fields.value.every((field) => places.has(field.path.join('.')))
    return isAtFields ? null : sentenceOf(value)
  })
  return { at, summary, fields }
}
