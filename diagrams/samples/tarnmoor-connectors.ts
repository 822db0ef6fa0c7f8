import type { SampleConnector } from './sample-document'

/** Connectors of the invented van that several of its circuits pass through: the same entry in each of them. */
export const tarnmoor = 'Tarnmoor 35 van, 2022'

export const tarnmoorC12: SampleConnector = {
  id: 'c12',
  label: 'C12',
  cavities: 12,
  rows: 2,
  numbering: 'rows',
  sides: { a: 'cab side', b: 'body side' },
  location: 'left kick panel, behind the trim',
  accessMinutes: 4,
}

export const tarnmoorCabModule: SampleConnector = {
  id: 'cm-a',
  label: 'Cab module A',
  cavities: 16,
  rows: 2,
  location: 'under the dash, right of the steering column',
  accessMinutes: 6,
}

export const tarnmoorBodyModule: SampleConnector = {
  id: 'bm-a',
  label: 'Body module A',
  cavities: 24,
  rows: 2,
  location: 'behind the left trim of the load space',
  accessMinutes: 8,
}
