import { expect, test } from 'vitest'
import { wayBack } from '@/lib/shared/way-back'

test('a page of this product is gone back to, with what it was asked', () => {
  expect(wayBack('/circuits?cavity=3')).toBe('/circuits?cavity=3')
})

test.each([
  'https://elsewhere.example/',
  '//elsewhere.example/x',
  '/\\elsewhere.example',
  '/\t/elsewhere.example',
  'javascript:alert(1)',
  '',
  undefined,
  ['/a', '/b'],
])('%j leads to Circuits, never out of the product', (to) => {
  expect(wayBack(to)).toBe('/circuits')
})
