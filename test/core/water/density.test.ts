import { describe, expect, it } from 'vitest'
import { freshDensity, seaDensity } from '../../../core/water'
import { expectClose, expectNear } from '../../support/close'

describe('freshDensity', () => {
  // IAPWS SR6-08(2011), table 8 (computer-program verification): 9 digits printed, so half a unit of the sixth decimal.
  // Read in two open test suites that quote the table; the release itself not re-read.
  it.each([
    [260, 997.06836],
    [298.15, 997.047013],
    [375, 957.00971],
  ])('matches IAPWS SR6-08 table 8 at %d K', (kelvin, density) => {
    expectNear(freshDensity(kelvin - 273.15), density, 0.5e-6 + 1e-9)
  })

  // Check W4: ITTC 7.5-02-01-03, fresh water at 15 C; 0.01 % as the list of checks states.
  it('gives the ITTC density at 15 C', () => {
    expectClose(freshDensity(15), 999.1026, 1e-4)
    // The rest of the difference is the pressure: 101325 against 100000 Pa times the compressibility 4.67e-10 1/Pa.
    // 7 digits are printed.
    expectNear(freshDensity(15) * (1 + 1325 * 4.67e-10), 999.1026, 1e-4)
  })

  it('is densest at 3.98 C', () => {
    // Maximum density of water at 3.98 C, a textbook value to 0.01 C; recalled, not re-read.
    const slopeAt = (t: number) => freshDensity(t + 0.001) - freshDensity(t - 0.001)
    expect(slopeAt(3.97)).toBeGreaterThan(0)
    expect(slopeAt(3.99)).toBeLessThan(0)
  })
})

describe('seaDensity', () => {
  // Check W1: UNESCO Technical Papers in Marine Science 44 (1983), check values of the one-atmosphere equation.
  // Five decimals are printed, so the values are held to 1e-5 kg/m3.
  it.each([
    [0, 5, 999.96675],
    [35, 5, 1027.67547],
    [35, 25, 1023.34306],
  ])('matches the UNESCO check value at salinity %d, %d C', (salinity, temperature, density) => {
    expectNear(seaDensity(salinity, temperature), density, 1e-5)
  })

  // Check W4: ITTC 7.5-02-01-03, sea water at 15 C (TEOS-10), 0.01 %.
  it('agrees with the ITTC sea water table at 15 C', () => {
    expectClose(seaDensity(35, 15), 1026.021, 1e-4)
  })

  it('meets fresh water at salinity 0', () => {
    // EOS-80 pure water is Bigg 1967 on the older temperature scale at 1 atm; IAPWS is at 0.1 MPa (6e-7). Scale: 3e-6.
    for (let t = 0; t <= 40; t += 5) expectClose(seaDensity(0, t), freshDensity(t), 5e-6)
  })

  it('rises with salinity and falls with temperature above 5 C at salinity 35', () => {
    for (let t = 5; t < 40; t++) expect(seaDensity(35, t + 1)).toBeLessThan(seaDensity(35, t))
    for (let s = 0; s < 42; s++) expect(seaDensity(s + 1, 20)).toBeGreaterThan(seaDensity(s, 20))
  })
})
