import type { Circuit } from '../document/circuit-schema'
import { conditionKey } from '../document/condition'
import type { Probe, Reading } from '../document/reading-schema'
import { buildNetwork } from '../solver/build-network'
import type { Network } from '../solver/network'
import { Study } from '../solver/study'
import { hypothesesOf, type Hypothesis } from './hypothesis'
import { cellStates, type CellStates } from './cell-states'
import { judgeReading, type JudgedReading } from './judged-reading'
import { predictAll, type PredictionTable } from './prediction-table'
import { runToEnd, type Steps } from './steps'

/** A circuit with all its hypotheses, and what each foretells for the readings asked so far. */
export class FaultModel {
  readonly network: Network
  readonly hypotheses: readonly Hypothesis[]
  /** Cells numbered through: 0 is the good circuit, then those of each hypothesis from here. */
  readonly firstCell: Int32Array
  readonly cellCount: number
  private readonly tables = new Map<string, PredictionTable>()
  private readonly statesOf = new WeakMap<Study, CellStates>()
  private readonly judgedBy = new Map<string, JudgedReading>()
  private readonly studies = new Map<string, Study>()

  constructor(
    readonly circuit: Circuit,
    parts?: { network: Network; hypotheses: readonly Hypothesis[] },
  ) {
    this.network = parts?.network ?? buildNetwork(circuit)
    this.hypotheses = parts?.hypotheses ?? runToEnd(hypothesesOf(circuit, this.network))
    let next = 1
    this.firstCell = Int32Array.from(this.hypotheses, ({ cells }) => (next += cells.length) - cells.length)
    this.cellCount = next
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
      const counts = this.hypotheses.map(({ cells }) => cells.length)
      this.tables.set(key, (found = predictAll(this.states(this.study(reading)), counts, reading)))
    }
    return found
  }

  /** One reading judged against every cell; kept, since a trace asks again with every further reading. */
  judged(reading: Reading): JudgedReading {
    const key = JSON.stringify({ ...reading, id: '' })
    let found = this.judgedBy.get(key)
    if (!found) {
      if (this.judgedBy.size > 300) this.judgedBy.clear()
      this.judgedBy.set(
        key,
        (found = judgeReading(this.network, this.hypotheses, this.table(reading), reading)),
      )
    }
    return found
  }

  private states(study: Study): CellStates {
    let found = this.statesOf.get(study)
    if (!found) this.statesOf.set(study, (found = cellStates(study, this.hypotheses)))
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

/** A study for a probe's condition, with the leads it adds. */
function studyFor(network: Network, { condition }: Probe): Study {
  const { added } = condition
  return new Study(added.length === 0 ? network : buildNetwork(network.circuit, added), condition)
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
