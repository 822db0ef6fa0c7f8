import { positionsIn, holds } from '../document/condition'
import { noAlteration } from '../solver/alteration'
import { drivingStudies } from '../solver/blown-fuses'
import { branchAmps, Case, voltsBetween, type Settled } from '../solver/case'
import type { Network } from '../solver/network'
import type { FaultModel } from './fault-model'
import { lookAtCells } from './report-evidence'

/** How a module finds one of its own pins, or fails to be found itself, otherwise than in a good vehicle. */
export type Aspect = 'low' | 'high' | 'no-current' | 'over-current' | 'asleep'

export interface View {
  /** `module.pin`, or the module alone when it sleeps. */
  point: string
  aspect: Aspect
  /** Number of the driving condition in which it does. */
  condition: number
}

/** A driver knows an open load from a whole one by half the current, a short by twice (and some); guesses. */
const openPart = 0.5
const overTimes = 2
const overAmps = 0.1
const leastAmps = 0.001
/** A feed counts as low from 9 V of 12.6 (a guess; makers differ). */
const feedLowPart = 9 / 12.6
/** A line held up or down by the module itself never comes nearer to its ends than this when all is well (a guess). */
const railPart = 0.9
/** What a driver's own pin is compared with, as an input's threshold that is not given. */
const driverThreshold = 6

interface WatchedPin {
  point: string
  module: number
  inner: number
  innerGround: number
  /** Branch whose current the module measures, or −1. */
  branch: number
  threshold: number
  /** Volts of the source behind an input; 0 for other pins. */
  railVolts: number
  supply: boolean
  /** True where the driver is told to conduct, by the number of the condition. */
  on: boolean[]
}

interface PinState {
  awake: boolean
  volts: number
  amps: number
}

const viewsByModel = new WeakMap<FaultModel, View[][][]>()

/**
 * Per hypothesis and cell: everything that any module would find otherwise than in a good vehicle, in any
 * combination of controls. A module asleep finds nothing; others find that it sleeps. Worked out once a model.
 */
export function moduleViews(model: FaultModel): View[][][] {
  let found = viewsByModel.get(model)
  if (!found) viewsByModel.set(model, (found = findViews(model)))
  return found
}

function findViews(model: FaultModel): View[][][] {
  const { network, hypotheses } = model
  if (network.modules.length === 0) return hypotheses.map((h) => h.cells.map(() => []))
  const studies = drivingStudies(network)
  const pins = watchedPins(
    network,
    studies.map((study) => positionsIn(network.circuit, study.condition.controls)),
  )
  const stateOf = (given: Case, settled: Settled): PinState[] =>
    pins.map((pin) => ({
      awake: settled.states.modules[pin.module]!,
      volts: voltsBetween(settled, pin.inner, pin.innerGround),
      amps: pin.branch < 0 ? 0 : Math.abs(branchAmps(given, settled, pin.branch)),
    }))
  const good = studies.map((study) => {
    const given = new Case(study, noAlteration)
    const settled = given.settle(0)
    return settled && { pins: stateOf(given, settled), modules: settled.states.modules }
  })
  const look = (cases: readonly Case[], severity: number): string =>
    cases
      .flatMap((given, s) => {
        const before = good[s]
        const settled = before && given.settle(severity)
        if (!settled) return []
        const asleep = network.modules.flatMap((module, m) =>
          before.modules[m] && !settled.states.modules[m] ? [`${module.node} asleep ${s}`] : [],
        )
        const changes = stateOf(given, settled).flatMap((now, p) =>
          aspectsOf(pins[p]!, before.pins[p]!, now, s).map((aspect) => `${pins[p]!.point} ${aspect} ${s}`),
        )
        return [...asleep, ...changes]
      })
      .join('|')
  const known = new Map<string, View[]>()
  const parse = (text: string): View[] => {
    let views = known.get(text)
    if (!views) known.set(text, (views = text === '' ? [] : text.split('|').map(viewOf)))
    return views
  }
  return hypotheses.map((hypothesis) => lookAtCells(network, studies, hypothesis, look).map(parse))
}

function viewOf(text: string): View {
  const [point, aspect, condition] = text.split(' ')
  return { point: point!, aspect: aspect as Aspect, condition: Number(condition) }
}

function aspectsOf(pin: WatchedPin, before: PinState, now: PinState, condition: number): Aspect[] {
  if (!now.awake) return []
  if (pin.supply) return before.awake && now.volts < feedLowPart * before.volts ? ['low'] : []
  const found = new Set<Aspect>()
  const is = (state: PinState) => state.volts >= pin.threshold
  if (is(now) !== is(before)) found.add(is(now) ? 'high' : 'low')
  if (pin.railVolts > 0) {
    const [top, foot] = [railPart * pin.railVolts, (1 - railPart) * pin.railVolts]
    if (now.volts > top && before.volts <= top) found.add('high')
    if (now.volts < foot && before.volts >= foot) found.add('low')
  }
  if (pin.branch >= 0 && pin.on[condition] && before.awake) {
    if (before.amps > leastAmps && now.amps < openPart * before.amps) found.add('no-current')
    if (now.amps > overTimes * before.amps + overAmps) found.add('over-current')
  }
  return [...found]
}

/** Inputs, drivers, regulated outputs and feeds: what a module can know something of. */
function watchedPins(network: Network, positions: ReturnType<typeof positionsIn>[]): WatchedPin[] {
  return network.modules.flatMap((state, module) => {
    const node = network.circuit.nodes.find((n) => n.id === state.node)
    if (node?.kind !== 'module') return []
    return node.pins.flatMap((pin): WatchedPin[] => {
      const { circuit } = pin
      const point = `${node.id}.${pin.pin}`
      const index = network.branchIndex.get(`pin:${point}/inner`)
      if (index === undefined) return []
      const branch = network.branches[index]!
      const common = { point, module, innerGround: state.innerGround, railVolts: 0, supply: false, on: [] }
      switch (circuit.type) {
        case 'supply':
          return [{ ...common, inner: branch.a, branch: -1, threshold: 0, supply: true }]
        case 'pull-up':
        case 'pull-down': {
          const input = network.inputs.find((i) => i.point === point)!
          const railVolts = circuit.type === 'pull-up' ? circuit.volts : 0
          return [{ ...common, inner: input.inner, branch: -1, threshold: input.threshold, railVolts }]
        }
        case 'low-side':
        case 'high-side':
        case 'source':
          return [
            {
              ...common,
              inner: circuit.type === 'high-side' ? branch.b : branch.a,
              branch: index,
              threshold: pin.threshold ?? (circuit.type === 'source' ? circuit.volts / 2 : driverThreshold),
              on: positions.map((setting) => holds(circuit.on, setting)),
            },
          ]
        default:
          return []
      }
    })
  })
}
