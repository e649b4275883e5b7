import { describe, expect, test } from 'vitest'
import {
  draftOf,
  emptyDraft,
  inputOf,
  problemsOf,
  withTerminals,
  type DeviceDraft,
} from '../../../src/components/devices/deviceDraft.js'
import { DeviceUpdate, NewDevice } from '../../../shared/contract/devices.js'
import { device } from '../samples.js'

const named = (change: Partial<DeviceDraft> = {}): DeviceDraft => ({ ...emptyDraft(), name: 'T-01', ...change })

test('a device survives the way through the form', () => {
  const before = device({ layers: [{ position: 1, name: 'ITO', material: 'ITO', thicknessNm: 80, junctionIndex: 0 }] })
  const sent = DeviceUpdate.parse({ ...inputOf(draftOf(before)), version: before.version })
  expect(sent.junctions.map((junction) => junction.id)).toEqual(before.junctions.map((junction) => junction.id))
  expect(sent).toMatchObject({ name: 'T-01', deviceAreaCm2: 1, apertureAreaCm2: null, version: 3 })
  expect(sent.layers).toEqual([{ name: 'ITO', material: 'ITO', thicknessNm: 80, junctionIndex: 0 }])
})

test('a name is all that a new device needs', () => {
  expect(NewDevice.parse(inputOf(named())).junctions.map((junction) => junction.label)).toEqual(['top', 'bottom'])
  expect(problemsOf(named())).toEqual([])
})

describe('what the form objects to', () => {
  const change = (part: Partial<DeviceDraft['junctions'][number]>): DeviceDraft => {
    const draft = named()
    return { ...draft, junctions: draft.junctions.map((one, i) => (i === 1 ? { ...one, ...part } : one)) }
  }
  test.each([
    ['no name', named({ name: ' ' }), ['name'], 'A name is needed.'],
    ['no label', change({ label: '' }), ['junctions', 1, 'label'], 'A junction needs a label.'],
    [
      'a gap in words',
      change({ nominalGapEv: 'wide' }),
      ['junctions', 1, 'nominalGapEv'],
      'This is not a number. Write it like 1.68.',
    ],
    ['a gap of zero', change({ nominalGapEv: '0' }), ['junctions', 1, 'nominalGapEv'], 'Give a number above zero.'],
    [
      'a gap beyond any',
      change({ nominalGapEv: '1120' }),
      ['junctions', 1, 'nominalGapEv'],
      'The largest number here is 10.',
    ],
    ['a negative area', named({ deviceAreaCm2: '-1' }), ['deviceAreaCm2'], 'Give a number above zero.'],
  ])('%s', (_, draft, path, message) => expect(problemsOf(draft)).toEqual([{ path, message }]))
})

describe('another wiring', () => {
  test('keeps what was typed about the first and the last junction', () => {
    const before = draftOf(device())
    const three = withTerminals(before, '3-junction')
    expect(three.junctions.map((one) => [one.label, one.absorber])).toEqual([
      ['top', 'perovskite'],
      ['middle', ''],
      ['bottom', 'silicon'],
    ])
    expect(three.junctions[2]?.id).toBe(before.junctions[1]?.id)
    expect(withTerminals(three, '2-terminal').junctions.map((one) => one.absorber)).toEqual(['perovskite', 'silicon'])
  })
  test('leaves labels alone that are not ours', () => {
    const draft = named()
    draft.junctions[0]!.label = 'GaInP'
    expect(withTerminals(draft, '4-junction').junctions.map((one) => one.label)).toEqual([
      'GaInP',
      'second',
      'third',
      'bottom',
    ])
  })
  test('four terminals keep both junctions as they are', () =>
    expect(withTerminals(named(), '4-terminal').junctions).toHaveLength(2))
  test('takes layers from junctions that are gone', () => {
    const draft = withTerminals(named(), '3-junction')
    draft.layers = [{ key: 1, name: 'InP', material: '', thicknessNm: '', junctionIndex: 2 }]
    expect(withTerminals(draft, '2-terminal').layers[0]?.junctionIndex).toBeNull()
  })
})
