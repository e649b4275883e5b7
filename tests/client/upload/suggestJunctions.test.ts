import { describe, expect, it } from 'vitest'
import type { Device } from '../../../shared/contract/devices.js'
import { suggestJunctions } from '../../../src/views/upload/suggestJunctions.js'

const junction = (id: string, position: number, label: string, nominalGapEv: number | null) => ({
  id,
  position,
  label,
  absorber: '',
  nominalGapEv,
  thicknessNm: null,
})
const device = { junctions: [junction('t', 1, 'Top cell', 1.68), junction('b', 2, 'Bottom cell', 1.12)] } as Device
const blue = { wavelengthNm: [300, 500, 740, 760], values: [0.5, 0.9, 0.8, 0] }
const red = { wavelengthNm: [700, 900, 1100, 1200], values: [0, 0.9, 0.7, 0] }

describe('suggestJunctions', () => {
  it('goes by the junction’s name where the file or column has it', () => {
    const result = suggestJunctions(
      [
        { key: '1', name: 'S12_bottom.csv EQE', curve: blue },
        { key: '2', name: 'S12_top.csv EQE', curve: red },
      ],
      device,
    )
    expect(Object.fromEntries(result)).toEqual({ '1': 'b', '2': 't' })
  })

  it('goes by the light a curve uses where names say nothing', () => {
    const result = suggestJunctions(
      [
        { key: '1', name: 'scan 7', curve: red },
        { key: '2', name: 'scan 8', curve: blue },
      ],
      device,
    )
    expect(Object.fromEntries(result)).toEqual({ '1': 'b', '2': 't' })
  })

  it('places a single curve by its edge and the nominal gaps', () => {
    expect(suggestJunctions([{ key: '1', name: 'scan', curve: red }], device).get('1')).toBe('b')
    expect(suggestJunctions([{ key: '1', name: 'scan', curve: blue }], device).get('1')).toBe('t')
  })

  it('gives the one curve left to the one junction left', () => {
    expect(suggestJunctions([{ key: '1', name: 'bot', curve: red }], device, new Set(['t'])).get('1')).toBe('b')
  })

  it('suggests nothing for a single curve when gaps are unknown', () => {
    const unknown = { junctions: [junction('t', 1, 'A', null), junction('b', 2, 'B', null)] } as Device
    expect(suggestJunctions([{ key: '1', name: 'scan', curve: red }], unknown).size).toBe(0)
  })
})
