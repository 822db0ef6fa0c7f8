import type { Problem } from '../document/check-circuit'
import type { Circuit } from '../document/circuit-schema'
import type { Probe, ReadingValue } from '../document/reading-schema'
import { branchAmps, theveninOhms, voltsBetween, type Case, type Settled } from './case'
import { deadVolts, ohmmeterLimitOhms, voltmeterOhms } from './constants'
import { openCase } from './faulted-case'
import { refuseReading } from './legal-reading'
import { inputSees, loadWorks, unstable } from './operating-point'
import type { PlantedFault } from './planted-fault'

/** What an exact meter shows: volts under its 10 Mohm, ohm or OL, amperes at the wire's `from` end. */
export function measure(
  circuit: Circuit,
  probe: Probe,
  fault?: PlantedFault,
): { ok: true; value: ReadingValue } | { ok: false; problem: Problem } {
  const problem = refuseReading(circuit, probe)
  if (problem) return { ok: false, problem }
  const opened = openCase(circuit, probe.condition, fault)
  if (!opened.ok) return opened
  const { given, severity } = opened.value
  const settled = given.settle(severity)
  return settled ? { ok: true, value: readMeter(given, settled, probe) } : { ok: false, problem: unstable }
}

/** The same on a settled network, for a probe that has been checked. */
export function readMeter(given: Case, settled: Settled, probe: Probe): ReadingValue {
  const { network } = given.study
  switch (probe.kind) {
    case 'volts': {
      const [a, b] = [network.unknownOf.get(probe.red)!, network.unknownOf.get(probe.black)!]
      return (voltsBetween(settled, a, b) * voltmeterOhms) / (voltmeterOhms + theveninOhms(settled, a, b))
    }
    case 'ohms': {
      const [a, b] = [network.unknownOf.get(probe.red)!, network.unknownOf.get(probe.black)!]
      const ohms = theveninOhms(settled, a, b)
      const volts = voltsBetween(settled, a, b)
      const shown = Math.abs(volts) > deadVolts ? liveOhms(ohms, volts) : ohms
      return shown > ohmmeterLimitOhms ? 'OL' : shown
    }
    case 'amps':
      return branchAmps(given, settled, network.branchIndex.get(`wire:${probe.wire}/from`)!)
    case 'works':
      return loadWorks(
        given,
        settled,
        network.loads.findIndex((load) => load.node === probe.node),
      )
    case 'sees':
      return inputSees(
        given,
        settled,
        network.inputs.findIndex((input) => input.point === probe.pin),
      )
  }
}

/**
 * A fault can leave a source on a circuit that should be dead. The meter, taken as 1 V behind
 * 10 kohm, divides what then stands at its leads as if it were all its own: a false figure,
 * never a negative one. (The 1 V and 10 kohm are from memory; meters differ.)
 */
function liveOhms(ohms: number, volts: number): number {
  const amps = (1 - volts) / (10_000 + ohms)
  const seen = volts + amps * ohms
  return seen >= 1 ? Infinity : Math.max(0, (seen * 10_000) / (1 - seen))
}
