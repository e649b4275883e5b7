import { totalIrradianceWM2, type Spectrum } from '../shared/physics/spectrum.js'
import type { Analysis } from './analyse.js'
import type { MeasuredDevice } from './measuredDevice.js'
import { columns } from './columns.js'

/** The analysis for reading at a terminal. */
export function analysisText(device: MeasuredDevice, spectrum: Spectrum, analysis: Analysis): string {
  const lowest = Math.min(...analysis.junctions.map((one) => one.jscMaCm2))
  const table = columns([
    ['junction', '', 'J (mA/cm²)', 'excess (mA/cm²)', 'gap (eV)', 'range (nm)', 'points'],
    ...analysis.junctions.map((one, i) => [
      String(i + 1),
      one.name,
      one.jscMaCm2.toFixed(3),
      device.wiring === 'series' ? (one.jscMaCm2 - lowest).toFixed(3) : '–',
      one.bandGapEv?.toFixed(3) ?? '–',
      `${one.rangeNm[0]}–${one.rangeNm[1]}`,
      String(one.points),
    ]),
  ])
  const lines = [
    `${device.name || 'Device'} under ${spectrum.name}, ${totalIrradianceWM2(spectrum).toFixed(2)} W/m²`,
    '',
    table,
    '',
    verdict(device, analysis),
  ]
  if (analysis.findings.length === 0) lines.push('', 'Findings: none.')
  else
    lines.push(
      '',
      'Findings:',
      ...analysis.findings.map((one) => `  ${one.severity}, junction ${one.junction}: ${one.message} [${one.check}]`),
    )
  return `${lines.join('\n')}\n`
}

function verdict(device: MeasuredDevice, { limitingJunction, mismatchPercent, junctions }: Analysis): string {
  if (device.wiring === 'independent') return 'The junctions have terminals of their own: no matching applies.'
  if (mismatchPercent === null) return 'A single junction: there is nothing to match.'
  if (limitingJunction === null) return 'Two junctions carry exactly the same current: no single one limits.'
  return `Junction ${limitingJunction} (${junctions[limitingJunction - 1]!.name}) limits; mismatch ${mismatchPercent.toFixed(2)} %.`
}
