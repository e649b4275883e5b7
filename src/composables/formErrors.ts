import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import { fieldErrorsOf, sentenceOf } from '../errors/sentences.js'

/** Spreads an error over a form: sentences at the fields they speak of, the rest above the form. */
export function useFormErrors(error: MaybeRefOrGetter<unknown>) {
  const fields = computed(() => fieldErrorsOf(toValue(error)))
  const at = (...path: (string | number)[]): string[] =>
    fields.value.filter((field) => field.path.join('.') === path.join('.')).map((field) => field.message)
  /** The sentence for the whole form; null when every word of it stands at a field. */
  const summary = computed(() => {
    const value = toValue(error)
    return value === null || value === undefined ? null : sentenceOf(value)
  })
  return { at, summary, fields }
}
