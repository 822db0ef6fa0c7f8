import { conditionKey, controlCombinations } from '@/diagrams/document/condition'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import { neighbourWires, sitesOf, type Mode } from '@/diagrams/document/sites'
import { candidateReadings } from '@/diagrams/planner/candidates'
import { noAlteration, withBlown, type Alteration } from '@/diagrams/solver/alteration'
import { blownFuses, drivingStudies, fuseBranch } from '@/diagrams/solver/blown-fuses'
import { Case } from '@/diagrams/solver/case'
import { alterationOf, isShort } from '@/diagrams/solver/fault-alteration'
import type { Network } from '@/diagrams/solver/network'
import { buildNetwork } from '@/diagrams/solver/build-network'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { Study } from '@/diagrams/solver/study'
import type { Subject } from './agree-with-ngspice'

/** Every site of a circuit in every mode, every neighbour and splice end of it, at both ends and in the middle of its severities. */
export function everyFault(circuit: Circuit): PlantedFault[] {
  return sitesOf(circuit).flatMap(({ id: site, modes }) =>
    modes.flatMap((mode) =>
      variantsOf(circuit, site, mode).flatMap((variant) =>
        severitiesOf(mode).map((severity): PlantedFault => ({ site, mode, ...variant, ...severity })),
      ),
    ),
  )
}

function variantsOf(circuit: Circuit, site: string, mode: Mode): Partial<PlantedFault>[] {
  if (mode === 'short-to-wire') return neighbourWires(circuit, site.slice(5)).map((other) => ({ other }))
  const splice = circuit.nodes.find((node) => node.kind === 'splice' && `part:${node.id}` === site)
  if (!splice) return [{}]
  const end = `${splice.id}.s`
  return circuit.wires.filter((w) => w.from === end || w.to === end).map((w) => ({ wire: w.id }))
}

function severitiesOf(mode: Mode): Partial<PlantedFault>[] {
  if (mode === 'weak') return [7, 9.5, 11.8].map((volts) => ({ volts }))
  if (mode === 'resistive') return [0.5, 200, 1e5].map((ohms) => ({ ohms }))
  if (isShort(mode)) return [0.01, 0.3, 10].map((ohms) => ({ ohms }))
  if (mode === 'open' || mode === 'blown' || mode === 'stuck-open')
    return [1e9, 1e12].map((ohms) => ({ ohms }))
  return [{}]
}

/** Every combination of controls, live and with the battery off, and all that the planner opens for any suspect. */
export function everyCondition(circuit: Circuit): Condition[] {
  const all = [
    ...controlCombinations(circuit, 1000).flatMap((controls) => [
      { ...restCondition, controls },
      { ...restCondition, controls, battery: false },
    ]),
    ...candidateReadings(
      circuit,
      sitesOf(circuit).map((site) => site.id),
      restCondition,
      { limit: 1e6 },
    ).map(({ condition }) => condition),
  ]
  return [...new Map(all.map((condition) => [conditionKey(circuit, condition), condition])).values()]
}

/**
 * Every fault in every condition, at rest; what does not come to rest is counted and left out.
 * `keep` decides which ones are taken, so that a part of them can be drawn by chance.
 */
export function* everyCase(
  circuit: Circuit,
  keep: () => boolean,
  unrest: (name: string) => void,
): Generator<Subject> {
  const network = buildNetwork(circuit)
  const driving = drivingStudies(network)
  const studies = everyCondition(circuit).map((condition) => new Study(network, condition))
  for (const fault of [undefined, ...everyFault(circuit)]) {
    let altered: { alteration: Alteration; severity: number } | null = null
    for (const study of studies) {
      if (!keep()) continue
      altered ??= fault ? alteredBy(network, driving, fault) : { alteration: noAlteration, severity: 0 }
      const given = new Case(study, altered.alteration)
      const settled = given.settle(altered.severity)
      const name = `${circuit.title} ${JSON.stringify(fault ?? 'good')} ${JSON.stringify(study.condition)}`
      if (settled) yield { name, given, settled }
      else unrest(name)
    }
  }
}

function alteredBy(network: Network, driving: Study[], fault: PlantedFault) {
  const alteration = alterationOf(network, fault)
  const severity = fault.volts ?? fault.ohms ?? 0
  const blown = isShort(fault.mode) ? blownFuses(network, driving, alteration, severity) : []
  return { alteration: withBlown(alteration, blown.map(fuseBranch)), severity }
}
