import type { Circuit } from '../document/circuit-schema'
import { conditionKey } from '../document/condition'
import type { Probe, Reading } from '../document/reading-schema'
import { buildNetwork } from '../solver/build-network'
import type { Network } from '../solver/network'
import type { Study } from '../solver/study'
import { hypothesesOf, type Hypothesis } from './hypothesis'
import { predictAll, studyFor, type PredictionTable } from './prediction-table'
import { runToEnd, type Steps } from './steps'

/** A circuit with all its hypotheses, and what each foretells for the readings asked so far. */
export class FaultModel {
  readonly network: Network
  readonly hypotheses: readonly Hypothesis[]
  private readonly tables = new Map<string, PredictionTable>()
  private readonly studies = new Map<string, Study>()

  constructor(
    readonly circuit: Circuit,
    parts?: { network: Network; hypotheses: readonly Hypothesis[] },
  ) {
    this.network = parts?.network ?? buildNetwork(circuit)
    this.hypotheses = parts?.hypotheses ?? runToEnd(hypothesesOf(circuit, this.network))
  }

  /** The same circuit, suspecting one site only. */
  only(site: string): FaultModel {
    return new FaultModel(this.circuit, {
      network: this.network,
      hypotheses: this.hypotheses.filter((hypothesis) => hypothesis.site === site),
    })
  }

  table(reading: Reading | Probe): PredictionTable {
    const key = probeKey(this.circuit, reading)
    let found = this.tables.get(key)
    if (!found) {
      // Bounded memory: a trace has tens of readings, not thousands.
      if (this.tables.size > 300) this.tables.clear()
      this.tables.set(key, (found = predictAll(this.study(reading), this.hypotheses, reading)))
    }
    return found
  }

  study(probe: Probe): Study {
    const key = conditionKey(this.circuit, probe.condition)
    let found = this.studies.get(key)
    if (!found) {
      if (this.studies.size > 300) this.studies.clear()
      this.studies.set(key, (found = studyFor(this.network, probe)))
    }
    return found
  }
}

/** The same key for the same measurement in an equal condition. */
export function probeKey(circuit: Circuit, probe: Probe | Reading): string {
  const what = leadsOf(probe)
  return `${probe.kind} ${what} ${conditionKey(circuit, probe.condition)}`
}

function leadsOf(probe: Probe | Reading): string {
  switch (probe.kind) {
    case 'volts':
    case 'ohms':
      return `${probe.red}|${probe.black}`
    case 'amps':
      return probe.wire
    case 'works':
      return probe.node
    case 'sees':
      return probe.pin
  }
}

const byObject = new WeakMap<Circuit, FaultModel>()
const byContent = new Map<string, FaultModel>()
/** Circuits traced at one time by one worker or process, about. */
const keptModels = 8

/** Models begun for a question that was dropped: the next one about the same circuit goes on with them. */
const begun = new Map<string, Begun>()
const keptBegun = 2

interface Begun {
  network: Network
  hypotheses: Steps<Hypothesis[]>
}

/**
 * The model of a circuit, kept while it is in use: a trace asks again with every reading. Equal
 * documents share one, since each message to a worker and each line of input is a new object.
 */
export function faultModelOf(circuit: Circuit): FaultModel {
  return runToEnd(faultModelSteps(circuit))
}

/** The same in portions; what was done of it is not done again by whoever asks next. */
export function* faultModelSteps(circuit: Circuit): Steps<FaultModel> {
  let found = byObject.get(circuit)
  if (found) return found
  const content = JSON.stringify(circuit)
  found = byContent.get(content)
  if (!found) {
    const { network, hypotheses } = beginModel(circuit, content)
    found = new FaultModel(circuit, { network, hypotheses: yield* hypotheses })
    begun.delete(content)
  }
  byObject.set(circuit, found)
  keepNewest(byContent, content, found, keptModels)
  return found
}

function beginModel(circuit: Circuit, content: string): Begun {
  let found = begun.get(content)
  if (!found) {
    const network = buildNetwork(circuit)
    found = { network, hypotheses: hypothesesOf(circuit, network) }
  }
  keepNewest(begun, content, found, keptBegun)
  return found
}

/** Least recently used goes first: a Map keeps the order of insertion. */
function keepNewest<T>(map: Map<string, T>, key: string, value: T, most: number): void {
  map.delete(key)
  map.set(key, value)
  for (const oldest of map.keys()) {
    if (map.size <= most) break
    map.delete(oldest)
  }
}
