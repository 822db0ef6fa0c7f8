import type { Circuit } from '../document/circuit-schema'
import { openCircuit } from '../document/open-circuit'
import { busPair } from './bus-pair'
import { coolingFan } from './cooling-fan'
import { fuelSender } from './fuel-sender'
import { heatedMirrors } from './heated-mirrors'
import { lampRequestLine } from './lamp-request-line'
import type { SampleDocument } from './sample-document'
import { tailgateButton } from './tailgate-button'
import { trailerLamps } from './trailer-lamps'
import { windowMotor } from './window-motor'

/** The sample circuits in rising difficulty, as the demo shop and school hold them. */
export const sampleDocuments: readonly SampleDocument[] = [
  lampRequestLine,
  tailgateButton,
  coolingFan,
  trailerLamps,
  fuelSender,
  busPair,
  windowMotor,
  heatedMirrors,
]

export const samples: Circuit[] = sampleDocuments.map(open)

function open(document: SampleDocument): Circuit {
  const opened = openCircuit(document)
  if (opened.ok) return opened.value
  const problem = opened.problems[0]
  throw new Error(`sample "${document.title}": ${problem?.path}: ${problem?.message}`)
}
