import { describe, expect, it } from 'vitest'
import { codeRanges } from '@/diagrams/tables/code-structure'
import { failureTypeMeaning, failureTypes } from '@/diagrams/tables/failure-types'
import { describeTroubleCode, parseTroubleCode, troubleCodeOfBytes } from '@/diagrams/tables/trouble-code'

/** Bytes and codes as public decodings print them, and two at the ends of the range worked out by hand. */
const published: [string, string][] = [
  ['0143', 'P0143'],
  ['0135', 'P0135'],
  ['C100', 'U0100'],
  ['C122', 'U0122'],
  ['C131', 'U0131'],
  ['C140', 'U0140'],
  ['C401', 'U0401'],
  ['C415', 'U0415'],
  ['C420', 'U0420'],
  ['C422', 'U0422'],
  ['1A2F', 'P1A2F'],
  ['3400', 'P3400'],
  ['4035', 'C0035'],
  ['8001', 'B0001'],
  ['BFFF', 'B3FFF'],
  ['0000', 'P0000'],
  ['FFFF', 'U3FFF'],
]
const bytesOf = (hex: string) => hex.match(/../g)!.map((pair) => parseInt(pair, 16))

describe('a trouble code', () => {
  it('is made of its bytes as the published decodings print it', () => {
    for (const [hex, code] of published) expect(troubleCodeOfBytes(bytesOf(hex)), hex).toBe(code)
    expect(troubleCodeOfBytes(bytesOf('013511'))).toBe('P0135-11')
    expect(troubleCodeOfBytes([1])).toBeNull()
    expect(troubleCodeOfBytes([1, 256])).toBeNull()
  })

  it('is taken apart, and what is none is refused', () => {
    expect(parseTroubleCode('B1042-13')).toEqual({ code: 'B1042', failureType: '13' })
    expect(parseTroubleCode('B1042')).toEqual({ code: 'B1042', failureType: null })
    for (const none of ['P4000', 'X0123', 'P012', 'P01G3', 'P0123-1', ''])
      expect(parseTroubleCode(none)).toBeNull()
  })

  it('says whose it is and what its failure type means', () => {
    expect(describeTroubleCode({ code: 'P0335', failureType: '15' })).toEqual({
      system: 'powertrain',
      area: 'ignition system or misfire',
      controlledBy: 'ISO/SAE',
      failure: 'circuit short to battery or open',
    })
    expect(describeTroubleCode({ code: 'B1A31', failureType: null })).toEqual({
      system: 'body',
      area: null,
      controlledBy: 'manufacturer',
      failure: null,
    })
  })
})

describe('the tables of codes', () => {
  it('give every possible code to one range', () => {
    for (const letter of 'PCBU')
      for (let number = 0; number < 0x4000; number++) {
        const code = letter + number.toString(16).toUpperCase().padStart(4, '0')
        expect(codeRanges.filter(({ from, to }) => code >= from && code <= to).length, code).toBe(1)
      }
  })

  it('list each failure type once, in order, and know the subject of the others', () => {
    const hexes = failureTypes.map((type) => type.hex)
    expect(hexes).toEqual([...new Set(hexes)].toSorted())
    expect(failureTypeMeaning('14')).toBe('circuit short to ground or open')
    expect(failureTypeMeaning('4A')).toBe('internal electronics')
    expect(failureTypeMeaning('A1')).toBeNull()
    expect(failureTypeMeaning('zz')).toBeNull()
  })
})
