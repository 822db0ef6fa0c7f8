import { describe, expect, it } from 'vitest'
import { metresOfOhms, murrayOhms, varleyOhms } from '@/diagrams/distance/bridge-methods'
import { faultFraction } from '@/diagrams/distance/fault-fraction'
import { conductorOhms, ohmsAtTemperature, strandedAreaMm2 } from '@/diagrams/distance/wire-resistance'
import {
  circularMilMm2,
  footMetres,
  gaugeAreaMm2,
  gaugeDiameterMm,
  readGauge,
} from '@/diagrams/tables/wire-gauge'
import worked from '@/tests/fixtures/worked-examples.json'

/* Published examples, sources in the fixture; every printed figure within its printed tolerance. */
type Inputs = Record<string, number>
interface Example {
  id: string
  title: string
  inputs: Inputs
  expected: { quantity: string; published: number; tolerance: number }[]
}
const exampleOf = (id: string) => worked.examples.find((one) => one.id === id) as unknown as Example

/** Each example's figures by the product's own functions, SI inside. */
const sums: Record<string, (inputs: Inputs) => Record<string, number>> = {
  'liec-awg14-run': ({ rho_ohm_cmil_per_ft, length_ft, area_cmil, supply_V }) => {
    const rho = (rho_ohm_cmil_per_ft! * circularMilMm2) / footMetres
    const one_wire = conductorOhms(rho, length_ft! * footMetres, area_cmil! * circularMilMm2)
    return { one_wire, loop: 2 * one_wire, current_far_end_joined: supply_V! / (2 * one_wire) }
  },
  'bird-3.7': ({ rho_ohm_m, length_m, diameter_m }) => ({
    R: conductorOhms(rho_ohm_m! * 1e6, length_m!, (Math.PI / 4) * (diameter_m! * 1e3) ** 2),
  }),
  'bird-3.11': ({ R20_ohm, alpha20_per_K, t_C }) => ({
    R100: ohmsAtTemperature(R20_ohm!, 20, t_C!, { perKelvin: alpha20_per_K! }),
  }),
  'bird-3.13': ({ R20_ohm, alpha0_per_K, t_C }) => ({
    R90: ohmsAtTemperature(R20_ohm!, 20, t_C!, { perKelvin: alpha0_per_K!, givenAtCelsius: 0 }),
  }),
  'grob-strands': ({ strands, strand_cmil }) => ({
    area: strandedAreaMm2(strands!, strand_cmil! * circularMilMm2) / circularMilMm2,
  }),
  'pps-11.21': ({ P_ohm, Q_ohm, length_m }) => ({
    // At 1 ohm a metre, which drops out: both conductors are alike.
    distance: metresOfOhms(murrayOhms({ p: P_ohm!, q: Q_ohm! }, 2 * length_m!), 1),
  }),
  'pps-11.23': ({ ratio_P_to_Q, faulty_ohm_per_1000m, sound_ohm_per_1000m, length_m }) => {
    const loop = ((faulty_ohm_per_1000m! + sound_ohm_per_1000m!) * length_m!) / 1000
    const X = murrayOhms({ p: ratio_P_to_Q!, q: 1 }, loop)
    return { loop, X, distance: metresOfOhms(X, faulty_ohm_per_1000m! / 1000) }
  },
  'pps-11.24': ({ S_ohm, ohm_per_km, length_km }) => {
    const X = varleyOhms({ p: 1, q: 1, s: S_ohm! }, 2 * ohm_per_km! * length_km!)
    return { X, distance: metresOfOhms(X, ohm_per_km! / 1000) / 1000 }
  },
}

describe('published sums on wires come out as printed', () => {
  it.each(Object.keys(sums))('%s', (id) => {
    const { inputs, expected } = exampleOf(id)
    const found = sums[id]!(inputs)
    for (const { quantity, published, tolerance } of expected)
      expect(Math.abs(found[quantity]! - published), `${quantity}: ${found[quantity]}`).toBeLessThanOrEqual(
        tolerance,
      )
  })

  it('bird-3.7 to the last figure: 0.180375602 ohm', () => {
    expect(sums['bird-3.7']!(exampleOf('bird-3.7').inputs).R).toBeCloseTo(0.180375602, 9)
  })
})

describe('the bridges of the handbooks and ohms from both ends find the same place', () => {
  const exact = (value: number) => ({ value, low: value, high: value })
  const fault = 7.3
  it.each([
    ['Murray, equal conductors', 'pps-11.21', 300, 300, 150],
    ['Murray, unlike conductors', 'pps-11.23', 0.5, 1.125, 433.333333 / 1000],
    ['Varley', 'pps-11.24', 400, 400, 300],
  ] as const)('%s', (_, __, faulty, __sound, bridged) => {
    // The same cable read from both ends to ground instead of balanced on a loop.
    const found = faultFraction({
      drawnOhms: { value: faulty, low: 0.9 * faulty, high: 1.1 * faulty },
      wholeOhms: exact(faulty),
      nearOhms: exact(bridged + fault),
      farOhms: exact(faulty - bridged + fault),
      leads: { low: 0, high: 0 },
    })
    expect(found!.value * faulty).toBeCloseTo(bridged, 5)
    expect(found!.faultOhms).toBeCloseTo(fault, 6)
  })
})

describe('American gauges', () => {
  // Rows of the table of solid copper in Lessons In Electric Circuits, vol. I: diameter in inches, circular mils.
  it.each([
    ['0000', 0.46, 211_600],
    ['1', 0.2893, 83_690],
    ['10', 0.1019, 10_380],
    ['14', 0.06408, 4107],
    ['20', 0.03196, 1022],
    ['27', 0.0142, 201.5],
  ] as const)('%s is %s in and %s circular mils', (written, inches, mils) => {
    const n = readGauge(written)!
    expect(Math.abs(gaugeDiameterMm(n) / 25.4 / inches - 1)).toBeLessThan(1e-3)
    expect(Math.abs(gaugeAreaMm2(n) / circularMilMm2 / mils - 1)).toBeLessThan(2e-3)
  })
  it('are read as people write them', () => {
    expect(['0', '00', '4/0', ' 18 ', '1/0'].map(readGauge)).toEqual([0, -1, -3, 18, 0])
    expect(['', 'x', '41', '-1', '5/0', '00000'].map(readGauge)).toEqual([null, null, null, null, null, null])
  })
})
