import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  BOLTZMANN_J_K,
  ELEMENTARY_CHARGE_C,
  PHOTON_ENERGY_NM_EV,
  PLANCK_J_S,
  SPEED_OF_LIGHT_M_S,
  thermalVoltage,
} from '../../shared/physics/constants.js'
import { DomainError } from '../../shared/physics/errors.js'
import { fromFraction, fromNanometres, toFraction, toNanometres } from '../../shared/physics/units.js'

describe('constants (CODATA 2018, exact; checks 1.1 to 1.8)', () => {
  it.each([
    ['1.1 c, m/s', SPEED_OF_LIGHT_M_S, 299_792_458],
    ['1.2 h, J s', PLANCK_J_S, 6.62607015e-34],
    ['1.3 q, C', ELEMENTARY_CHARGE_C, 1.602176634e-19],
    ['1.4 k, J/K', BOLTZMANN_J_K, 1.380649e-23],
  ])('%s', (_, value, expected) => expect(value).toBe(expected))

  it('1.5 hc/q', () => expect(Math.abs(PHOTON_ENERGY_NM_EV - 1239.841984332)).toBeLessThan(1e-9))

  it.each([
    ['1.7', 298.15, 0.025692579],
    ['1.8', 300, 0.025852],
  ])('%s thermal voltage at %s K', (_, kelvin, volt) =>
    expect(Math.abs(thermalVoltage(kelvin) - volt)).toBeLessThan(1e-9),
  )
})

describe('responsivity (IEC 60904-8)', () => {
  it.each([
    ['1.9', 1, 1239.842, 1],
    // 0.9 · 650/1239.841984, by hand
    ['1.11', 0.9, 650, 0.471834],
  ])('check %s: SR of EQE %s at %s nm', (_, eqe, nm, responsivity) => {
    expect(Math.abs(fromFraction(eqe, 'A/W', nm) - responsivity)).toBeLessThan(1e-6)
    expect(Math.abs(toFraction(responsivity, 'A/W', nm) - eqe)).toBeLessThan(2e-6)
  })
})

describe('conversions', () => {
  it('states one wavelength in four units', () => {
    expect(toNanometres(650, 'nm')).toBe(650)
    expect(toNanometres(0.65, 'um')).toBeCloseTo(650, 10)
    expect(toNanometres(6500, 'angstrom')).toBe(650)
    expect(toNanometres(1.12, 'eV')).toBeCloseTo(1107.0018, 4)
  })

  it('takes a percent value as exactly its hundredth', () => {
    expect(toFraction(87.3, 'percent', 500)).toBe(0.873)
    expect(toFraction(0.873, 'fraction', 500)).toBe(0.873)
  })

  it('comes back from every unit to 1e-15 relative', () => {
    const nanometres = fc.double({ min: 100, max: 5000, noNaN: true })
    fc.assert(
      fc.property(nanometres, fc.constantFrom('nm', 'um', 'angstrom', 'eV'), (nm, unit) => {
        expect(Math.abs(toNanometres(fromNanometres(nm, unit), unit) / nm - 1)).toBeLessThan(1e-15)
      }),
      { seed: 11 },
    )
    fc.assert(
      fc.property(
        fc.double({ min: 1e-6, max: 1.5 }),
        nanometres,
        fc.constantFrom('fraction', 'percent', 'A/W'),
        (eqe, nm, unit) => {
          expect(Math.abs(toFraction(fromFraction(eqe, unit, nm), unit, nm) / eqe - 1)).toBeLessThan(1e-15)
        },
      ),
      { seed: 12 },
    )
  })

  it.each([
    ['zero', 0],
    ['below zero', -300],
    ['not a number', NaN],
    ['infinite', Infinity],
  ])('refuses a wavelength that is %s', (_, value) => {
    expect(() => toNanometres(value, 'eV')).toThrow(DomainError)
    expect(() => fromNanometres(value, 'eV')).toThrow(/wavelengthNm is .*; it must be a number above zero\./)
  })

  it('refuses a value that is no number', () => {
    expect(() => toFraction(NaN, 'percent', 500)).toThrow(/value is NaN; it must be a finite number\./)
    expect(() => fromFraction(Infinity, 'percent', 500)).toThrow(/eqe is Infinity/)
  })

  it('refuses a responsivity without the wavelength it belongs to', () => {
    expect(() => toFraction(0.4, 'A/W', 0)).toThrow(/wavelengthNm is 0; it must be a number above zero\./)
    expect(() => fromFraction(0.4, 'A/W', NaN)).toThrow(/wavelengthNm is NaN/)
  })
})
