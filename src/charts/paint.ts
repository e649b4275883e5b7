import type { Paint } from '../../shared/charts/lineChart.geometry.js'

/** CSS colour of a paint; the custom properties come from the theme, so charts follow light and dark. */
export function colourOf(paint: Paint): string {
  if (paint.kind === 'junction') return `var(--junction-${((paint.position - 1) % 4) + 1})`
  return `var(--${paint.kind})`
}
