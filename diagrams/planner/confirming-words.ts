import type { Circuit } from '../document/circuit-schema'
import { nodeName, parsePoint, pointName } from '../document/points'
import type { Probe, ReadingValue } from '../document/reading-schema'
import type { ConfirmingReading } from './confirming-reading'
import { capital, conditionWords, figure, probeWords } from './wording'

/** "Before a new fuse goes into F7: F7 out, ohms to chassis. F7 pulled, battery disconnected. 90 ohm; with the fault 0.50 ohm." */
export function confirmingWords(
  circuit: Circuit,
  { probe, expected, withFault, proves, repeats }: Omit<ConfirmingReading, 'says'>,
): string {
  const condition = capital(conditionWords(circuit, probe.condition))
  const how = [...placeWords(circuit, probe), condition].filter(Boolean).map((part) => `${part}.`)
  const good = `${capital(shownWords(probe, expected))} in a good circuit`
  const told = withFault === null ? `${good}.` : `${good}, ${shownWords(probe, withFault)} with the fault.`
  return [leadIn(circuit, probe, proves, repeats), ...how, told].filter(Boolean).join(' ')
}

function leadIn(
  circuit: Circuit,
  probe: Probe,
  proves: ConfirmingReading['proves'],
  repeats: number | undefined,
): string {
  switch (proves) {
    case 'cause-gone': {
      const point = probe.kind === 'ohms' ? parsePoint(probe.red) : null
      const fuse = circuit.nodes.find((node) => node.id === point?.node)
      return `Before a new fuse goes into ${fuse ? nodeName(fuse) : 'its holder'}:`
    }
    case 'under-load':
      return 'Under load:'
    case 'job-done':
      return ''
    case 'was-wrong':
      return `R${(repeats ?? 0) + 1} again:`
  }
}

function placeWords(circuit: Circuit, probe: Probe): string[] {
  // Across two points a drop is what is read.
  if (probe.kind === 'volts' && probe.black !== 'chassis')
    return [`${pointName(circuit, probe.red)} to ${pointName(circuit, probe.black)}`, 'Volts across']
  return probeWords(circuit, probe)
}

function shownWords(probe: Probe, value: ReadingValue): string {
  if (typeof value === 'boolean') return value ? 'it works' : 'it does not work'
  return typeof value === 'number' ? figure(probe.kind, value) : value
}
