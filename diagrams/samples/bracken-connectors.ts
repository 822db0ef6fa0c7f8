import type { SampleConnector } from './sample-document'

/** Connectors of the invented estate, the same entry in each of its circuits. */
export const bracken = 'Bracken L4 estate, 2021'

export const brackenEngineModule: SampleConnector = {
  id: 'ecm-a',
  label: 'Engine module A',
  cavities: 48,
  rows: 3,
  numbering: 'rows',
  location: 'left of the engine, on the wing',
  accessMinutes: 5,
}

export const brackenC21: SampleConnector = {
  id: 'c21',
  label: 'C21',
  cavities: 16,
  rows: 2,
  numbering: 'rows',
  sides: { a: 'front side', b: 'engine side' },
  location: 'behind the left headlamp',
  accessMinutes: 5,
}

export const brackenC51: SampleConnector = {
  id: 'c51',
  label: 'C51',
  cavities: 6,
  rows: 2,
  numbering: 'rows',
  sides: { a: 'body side', b: 'tank side' },
  location: 'under the rear seat, beside the tank cover',
  accessMinutes: 8,
}

export const brackenC14: SampleConnector = {
  id: 'c14',
  label: 'C14',
  cavities: 14,
  rows: 2,
  numbering: 'snake',
  sides: { a: 'engine side', b: 'cabin side' },
  location: 'bulkhead, left of the pedals',
  accessMinutes: 4,
}
