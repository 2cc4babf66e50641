import { describe, expect, it } from 'vitest'
import { freshDensity, freshViscosity, seaDensity, seaViscosity, waterViscosity } from '../../../core/water'
import table from '../../published/iapws-r12-08-table-4.json'
import { expectClose, expectNear } from '../../support/close'

describe('waterViscosity', () => {
  // Check W2 and the rest of its table. Six decimals are printed: half a unit of the last.
  it.each(table.rows)('matches IAPWS R12-08 table 4 at $temperature K, $density kg/m3', (row) => {
    expectNear(waterViscosity(row.temperature, row.density) * 1e6, row.viscosity, 0.5e-6 + 1e-9)
  })
})

describe('freshViscosity', () => {
  // Check W5: ISO/TR 3666, 1.0016 mPa s at 20 C +- 0.02 % (the last digit alone is 0.005 %).
  it('gives 1.0016 mPa s at 20 C', () => {
    expectClose(freshViscosity(20), 1.0016e-3, 2e-4)
  })

  // Check W4: ITTC 7.5-02-01-03, 1.1386e-6 m2/s at 15 C; the list of checks holds it to 0.1 %, the five printed
  // digits to half a unit of the last.
  it('gives the ITTC kinematic viscosity at 15 C', () => {
    expectNear(freshViscosity(15) / freshDensity(15), 1.1386e-6, 0.5e-10)
  })

  // IAPWS SR6-08, table 8: 889.996774 microPa s at 298.15 K, from its own four-term formula; the two formulas of
  // IAPWS agree to well inside 0.1 %. Read in an open test suite that quotes the table.
  it('agrees with the shorter formula of IAPWS SR6-08 at 25 C', () => {
    expectClose(freshViscosity(25), 889.996774e-6, 1e-4)
  })
})

/** Sharqawy et al. 2010, eq. 23: their own fit of fresh water, for 0 to 180 C (recalled, found in an open toolbox). */
function sharqawyFresh(t: number): number {
  return 4.2844e-5 + 1 / (0.157 * (t + 64.993) ** 2 - 91.296)
}

describe('seaViscosity', () => {
  // Check W4: ITTC 7.5-02-01-03, sea water at 15 C: 1.1892e-6 m2/s, 0.1 %.
  it('gives the ITTC kinematic viscosity at 15 C', () => {
    expectClose(seaViscosity(35, 15) / seaDensity(35, 15), 1.1892e-6, 1e-3)
  })

  it('is fresh water at salinity 0, and that is the fit of Sharqawy et al. to 0.05 %', () => {
    for (let t = 0; t <= 40; t += 4) {
      expect(seaViscosity(0, t)).toBe(freshViscosity(t))
      // The paper states its fit of the IAPWS 2008 data to +- 0.05 %; recalled, not re-read.
      expectClose(freshViscosity(t), sharqawyFresh(t), 5e-4)
    }
  })

  it('is 6 to 9 % above fresh water at salinity 35', () => {
    // Millero 1974 in The Sea, vol. 5: 1.07 at 20 C with a few tenths of a percent either way; recalled, not re-read.
    for (let t = 0; t <= 40; t += 4) {
      const ratio = seaViscosity(35, t) / freshViscosity(t)
      expect(ratio).toBeGreaterThan(1.06)
      expect(ratio).toBeLessThan(1.09)
    }
  })

  // A second formula: Millero 1974, as in an open oceanographic toolbox, whose printed check value is
  // 9.6541e-4 Pa s at 25 C, salinity 40, density of sea water. Sharqawy et al. state 1.5 % for theirs.
  it('agrees with the check value of Millero 1974 at 25 C, salinity 40', () => {
    expectClose(seaViscosity(40, 25), 9.6541e-4, 1.5e-2)
  })
})
