import type { Standing } from './failure-types'

/**
 * Structure of a trouble code (SAE J2012, ISO 15031-6): two bytes, high byte first. Bits 15 and 14 give the letter, 13 and 12 the
 * first digit, each further four bits a hexadecimal digit. A third byte is the failure type, printed after a hyphen:
 * P0135-11. Looked up in public copies of the grouping and a public bit-by-bit decoding; the standards were not read.
 */
export const codeLetters = [
  { letter: 'P', system: 'powertrain' },
  { letter: 'C', system: 'chassis' },
  { letter: 'B', system: 'body' },
  { letter: 'U', system: 'network' },
] as const

export interface CodeRange {
  from: string
  to: string
  controlledBy: string
  standing: Standing
}

/** Who gives out which codes. Not confirmed: who controls C3 and B3 (copies say reserved), and how U3 is split. */
export const codeRanges: readonly CodeRange[] = [
  { from: 'P0000', to: 'P0FFF', controlledBy: 'ISO/SAE', standing: 'high' },
  { from: 'P1000', to: 'P1FFF', controlledBy: 'manufacturer', standing: 'high' },
  { from: 'P2000', to: 'P2FFF', controlledBy: 'ISO/SAE', standing: 'high' },
  { from: 'P3000', to: 'P33FF', controlledBy: 'manufacturer', standing: 'high' },
  { from: 'P3400', to: 'P3FFF', controlledBy: 'ISO/SAE', standing: 'high' },
  { from: 'C0000', to: 'C0FFF', controlledBy: 'ISO/SAE', standing: 'high' },
  { from: 'C1000', to: 'C1FFF', controlledBy: 'manufacturer', standing: 'high' },
  { from: 'C2000', to: 'C2FFF', controlledBy: 'manufacturer', standing: 'high' },
  { from: 'C3000', to: 'C3FFF', controlledBy: 'reserved by the document', standing: 'medium' },
  { from: 'B0000', to: 'B0FFF', controlledBy: 'ISO/SAE', standing: 'high' },
  { from: 'B1000', to: 'B1FFF', controlledBy: 'manufacturer', standing: 'high' },
  { from: 'B2000', to: 'B2FFF', controlledBy: 'manufacturer', standing: 'high' },
  { from: 'B3000', to: 'B3FFF', controlledBy: 'reserved by the document', standing: 'medium' },
  { from: 'U0000', to: 'U0FFF', controlledBy: 'ISO/SAE', standing: 'high' },
  { from: 'U1000', to: 'U1FFF', controlledBy: 'manufacturer', standing: 'high' },
  { from: 'U2000', to: 'U2FFF', controlledBy: 'manufacturer', standing: 'high' },
  {
    from: 'U3000',
    to: 'U3FFF',
    controlledBy: 'ISO/SAE and manufacturer, split not confirmed',
    standing: 'low',
  },
]

/** What the second digit of a P0 code is about. Standing high for P00 to P06, medium from P07 on. */
export const powertrainAreas: Readonly<Record<string, string>> = {
  P00: 'fuel and air metering, auxiliary emission controls',
  P01: 'fuel and air metering',
  P02: 'fuel and air metering',
  P03: 'ignition system or misfire',
  P04: 'auxiliary emission controls',
  P05: 'vehicle speed, idle control and auxiliary inputs',
  P06: 'computer and output circuits',
  P07: 'transmission',
  P08: 'transmission',
  P09: 'transmission',
  P0A: 'hybrid propulsion',
  P0B: 'hybrid propulsion',
}

/** How a tester says in which form it prints codes (ISO 14229-1 service 0x19, looked up in public pages; standing high). */
export const codeFormatIdentifiers: Readonly<Record<string, string>> = {
  '00': 'SAE J2012-DA, two-byte code',
  '01': 'ISO 14229-1, three-byte code',
  '02': 'SAE J1939-73',
  '03': 'ISO 11992-4',
  '04': 'SAE J2012-DA, three-byte code',
}

/** Groups of codes that can be cleared together (ISO 14229-1 service 0x14; standing high for the last two, else medium). */
export const codeGroups: Readonly<Record<string, string>> = {
  '100000': 'powertrain',
  '400000': 'chassis',
  '800000': 'body',
  C00000: 'network',
  FFFF33: 'emissions related',
  FFFFFF: 'all',
}
