import { describe, expect, it } from 'vitest'
import { codeKey, colourKey, endOfBeginning, textKey, wordsOf } from '@/db/circuits/search-keys'

describe('the keys of the search', () => {
  it('bring what is typed and what is stored to one form', () => {
    expect(textKey('  Tarnmoor\t 35  VAN ')).toBe('tarnmoor 35 van')
    expect(textKey('Ｃ１２')).toBe('c12')
    expect(wordsOf('SW5 to K3.86, coil-feed; coil Feed')).toEqual(['sw5', 'to', 'k3', '86', 'coil', 'feed'])
    expect(wordsOf('%_ -- ()')).toEqual([])
  })

  it('read base and stripe of a colour however it is written', () => {
    for (const written of ['BU/WH', 'bu-wh', 'BU WH', 'BUWH'])
      expect(colourKey(written)).toEqual({ base: 'BU', stripe: 'WH' })
    expect(colourKey('GNYE')).toEqual({ base: 'GN', stripe: 'YE' })
    expect(colourKey('rd')).toEqual({ base: 'RD', stripe: '' })
    expect(colourKey('RD/')).toEqual({ base: 'RD', stripe: '' })
    expect(colourKey('')).toEqual({ base: '', stripe: '' })
  })

  it('join code and failure type as the trade writes them', () => {
    expect(codeKey('B1042', '13')).toBe('B1042-13')
    expect(codeKey('B1042', undefined)).toBe('B1042')
  })

  it('bound every text that begins alike, and no other, in byte order', () => {
    const bytes = (text: string) => Buffer.from(text).toString('hex')
    for (const longer of ['c1', 'c12', 'c1é', 'c1😀'])
      expect(bytes(longer) >= bytes('c1') && bytes(longer) < bytes(endOfBeginning('c1'))).toBe(true)
    for (const other of ['c0', 'c2', 'c', 'd1']) {
      const inside = bytes(other) >= bytes('c1') && bytes(other) < bytes(endOfBeginning('c1'))
      expect([other, inside]).toEqual([other, false])
    }
  })
})
