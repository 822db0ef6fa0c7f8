import type { SampleConnector } from './sample-document'

/** Connectors of the invented hatchback, the same entry in each of its circuits. */
export const quillan = 'Quillan 2 hatchback, 2020'

export const quillanC31: SampleConnector = {
  id: 'c31',
  label: 'C31',
  cavities: 10,
  rows: 2,
  numbering: 'rows',
  sides: { a: 'body side', b: 'tailgate side' },
  location: 'above the rear seat back, left hinge of the tailgate',
  accessMinutes: 7,
}

export const quillanC61: SampleConnector = {
  id: 'c61',
  label: 'C61',
  cavities: 8,
  rows: 2,
  numbering: 'rows',
  sides: { a: 'door side', b: 'body side' },
  location: 'left front door post, in the rubber sleeve',
  accessMinutes: 6,
}

export const quillanBodyModule: SampleConnector = {
  id: 'bcm-a',
  label: 'Body module A',
  cavities: 24,
  rows: 2,
  location: 'behind the glove box',
  accessMinutes: 5,
}
