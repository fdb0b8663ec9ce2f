import { describe, expect, it } from 'vitest'
import { chassisAmpacity } from '#shared/electrical/ampacity.ts'
import { awgArea_mm2, awgDiameter_mm, gaugeOfArea, wireResistance_ohm } from '#shared/electrical/copper.ts'

const feetPerMetre = 1 / 0.3048

/**
 * Handbook of Electronic Tables and Formulas [S57], as printed: gauge, ohm per 1000 ft at 20 degC, amperes for chassis
 * wiring. Diameter and area follow from the gauge's own formula.
 */
const handbook = [
  { awg: 14, diameter_mm: 1.628, area_mm2: 2.08, ohmPer1000ft: 2.525, chassis_A: 32 },
  { awg: 16, diameter_mm: 1.291, area_mm2: 1.31, ohmPer1000ft: 4.016, chassis_A: 22 },
  { awg: 18, diameter_mm: 1.024, area_mm2: 0.823, ohmPer1000ft: 6.385, chassis_A: 16 },
  { awg: 20, diameter_mm: 0.812, area_mm2: 0.518, ohmPer1000ft: 10.15, chassis_A: 11 },
  { awg: 22, diameter_mm: 0.644, area_mm2: 0.326, ohmPer1000ft: 16.14, chassis_A: 7 },
  { awg: 24, diameter_mm: 0.511, area_mm2: 0.205, ohmPer1000ft: 25.67, chassis_A: 3.5 },
  { awg: 26, diameter_mm: 0.405, area_mm2: 0.129, ohmPer1000ft: 40.81, chassis_A: 2.2 },
  { awg: 28, diameter_mm: 0.321, area_mm2: 0.081, ohmPer1000ft: 64.9, chassis_A: 1.4 },
]

/** Share by which a value lies off the printed one. */
const off = (value: number, printed: number): number => Math.abs(value / printed - 1)

describe('wire against the handbook [S57]', () => {
  it.each(handbook)('$awg AWG: diameter, area, resistance, chassis current', (row) => {
    expect(off(awgDiameter_mm(row.awg), row.diameter_mm)).toBeLessThan(0.002)
    expect(off(awgArea_mm2(row.awg), row.area_mm2)).toBeLessThan(0.007)
    const per1000ft = wireResistance_ohm((1000 * 1000) / feetPerMetre, awgArea_mm2(row.awg), 1, 20)
    expect(off(per1000ft, row.ohmPer1000ft)).toBeLessThan(0.002)
    expect(chassisAmpacity(row.awg)).toMatchObject({ ampere: row.chassis_A, fromMemory: false })
  })

  it('doubles the diameter in six gauges and the area in three', () => {
    expect(off(awgDiameter_mm(12) / awgDiameter_mm(18), 2)).toBeLessThan(0.006)
    expect(off(awgArea_mm2(15) / awgArea_mm2(18), 2)).toBeLessThan(0.006)
  })

  it('takes the thinner row between two of the table', () => {
    expect(chassisAmpacity(19)).toMatchObject({ awg: 20, ampere: 11 })
    expect(chassisAmpacity(45)).toMatchObject({ awg: 40 })
  })
})

describe('copper [S58]', () => {
  it('has 0.017241 ohm mm2/m at 20 degC', () => {
    expect(wireResistance_ohm(1000, 1, 1, 20)).toBeCloseTo(0.017241, 12)
  })

  it('rises by about 28 per cent to 90 degC', () => {
    const rise = wireResistance_ohm(1000, 1, 1, 90) / wireResistance_ohm(1000, 1, 1, 20)
    expect(rise).toBeGreaterThan(1.27)
    expect(rise).toBeLessThan(1.285)
  })

  it('shares between wires in parallel and grows with length', () => {
    const one = wireResistance_ohm(600, awgArea_mm2(18), 1, 20)
    expect(wireResistance_ohm(600, awgArea_mm2(18), 2, 20)).toBeCloseTo(one / 2, 15)
    expect(wireResistance_ohm(1200, awgArea_mm2(18), 1, 20)).toBeCloseTo(one * 2, 15)
    // 0.60 m of 18 AWG: 12.57 mohm.
    expect(one * 1000).toBeCloseTo(12.57, 2)
  })
})

describe('gauge of an area', () => {
  it('is the gauge itself for its own area, and the thinner one between two', () => {
    for (let awg = 0; awg <= 40; awg++) expect(gaugeOfArea(awgArea_mm2(awg))).toBe(awg)
    expect(gaugeOfArea(0.8)).toBe(19)
    expect(gaugeOfArea(0.75)).toBe(19)
    expect(gaugeOfArea(500)).toBe(0)
    expect(gaugeOfArea(0)).toBe(40)
  })
})
