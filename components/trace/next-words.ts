import type { Circuit } from '@/diagrams/document/circuit-schema'
import { connectorName, parsePoint, pointName } from '@/diagrams/document/points'
import { portsOf } from '@/diagrams/document/ports'
import { siteName } from '@/diagrams/document/sites'
import type { NextOutcome, NextReading } from '@/diagrams/faults/answer'
import { capital, conditionWords } from '@/lib/client/meter/reading-words'
import { shortSiteName } from './site-words'

/** Where the next reading is taken, as its heading says it. */
export function nextTitle(circuit: Circuit, next: NextReading): string {
  switch (next.kind) {
    case 'volts':
    case 'ohms': {
      const red = pointName(circuit, next.red ?? '')
      return next.black === 'chassis' || !next.black ? red : `${red} to ${pointName(circuit, next.black)}`
    }
    case 'amps':
      return siteName(circuit, `wire:${next.wire ?? ''}`)
    case 'works':
      return siteName(circuit, `part:${next.node ?? ''}`)
    case 'sees':
      return pointName(circuit, next.pin ?? '')
  }
}

/** How it is taken: "Back-probe volts to chassis. Key on, SW5 held." */
export function nextHow(circuit: Circuit, next: NextReading): string {
  const state = `${capital(conditionWords(circuit, next.condition))}.`
  switch (next.kind) {
    case 'volts':
      return `Back-probe volts${next.black === 'chassis' ? ' to chassis' : ''}. ${state}`
    case 'ohms':
      return `Ohms${next.black === 'chassis' ? ' to chassis' : ''}. ${state}`
    case 'amps':
      return `Clamp round the wire. ${state}`
    case 'works':
      return `Look whether it works. ${state}`
    case 'sees':
      return `Read it in the live data. ${state}`
  }
}

/** "about 3 minutes, left kick panel" */
export function nextEffort(circuit: Circuit, next: NextReading): string {
  const minutes = Math.max(1, Math.round(next.minutes))
  const about = `about ${minutes} ${minutes === 1 ? 'minute' : 'minutes'}`
  const connector = connectorOf(circuit, next.red ?? next.pin ?? '')
  return connector?.location ? `${about}, ${connector.location}` : about
}

/** The connector whose face is worth showing beside a point, and the cavity in it. */
export function connectorOf(circuit: Circuit, point: string) {
  const parsed = parsePoint(point)
  const node = parsed && circuit.nodes.find((one) => one.id === parsed.node)
  const port = node && portsOf(node).find((one) => one.name === parsed.port)
  const connector = circuit.connectors.find((one) => one.id === port?.connector)
  if (!connector || port?.cavity === null || port?.cavity === undefined) return null
  return {
    connector,
    cavity: port.cavity,
    name: connectorName(connector),
    location: connector.location,
    /** Inline connectors are told by their cavities, a part's own connector by the part. */
    inline: node?.kind === 'cavity',
  }
}

/** "C12 cavity 3 or the wire to K3 86": the likeliest first, the rest counted. */
export function leavesWords(circuit: Circuit, outcome: NextOutcome, most = 2): string {
  const names = outcome.leaves.slice(0, most).map((site) => shortSiteName(circuit, site))
  const more = outcome.leaves.length - names.length
  if (more > 0) return `${names.join(', ')} and ${more} more`
  return names.join(' or ')
}
