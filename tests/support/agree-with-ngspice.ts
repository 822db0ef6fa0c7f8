import { at, branchAmps, unitCurrentIn, voltsAt, type Case, type Settled } from '@/diagrams/solver/case'
import { pinJointOhms } from '@/diagrams/solver/constants'
import { netlistOf } from '@/diagrams/solver/settled-netlist'
import { solveBig, toDouble } from './big-float'
import { runNgspice, type Deck, type DeckAnswer } from './ngspice'
import type { Random } from './random'

/** A network at rest, to be solved once more by ngspice. */
export interface Subject {
  name: string
  given: Case
  settled: Settled
}

export type Unit = 'V' | 'A' | 'V at 1 mA'

/** How far both solvers agree. `nearest` is the worst difference as a part of what is allowed: 1 is the limit. */
export interface Agreement {
  compared: number
  values: number
  worst: Record<Unit, number>
  nearest: number
  where: string
  /**
   * Volts on which 320 bits were asked, because the two differed by more than is allowed: on a floating part ngspice's
   * own matrix loses digits. Here the reference stands in for ngspice.
   */
  referred: number
}

const relativeLimit = 1e-6
/** Volts or amperes. */
const floor = 1e-6
const decksAtOnce = 400

/**
 * Solves the linear elements of every subject in ngspice and compares every point and every current.
 * With the battery off there is nothing to see in a dead circuit, so a milliampere is sent through a
 * pair of points instead, as an ohmmeter would.
 */
export function agreeWithNgspice(subjects: Iterable<Subject>, random: Random): Agreement {
  const found: Agreement = {
    compared: 0,
    values: 0,
    worst: { V: 0, A: 0, 'V at 1 mA': 0 },
    nearest: 0,
    where: '',
    referred: 0,
  }
  let waiting: { deck: Deck; check: (answer: DeckAnswer) => void }[] = []
  const flush = () => {
    const answers = runNgspice(waiting.map(({ deck }) => deck))
    waiting.forEach(({ check }, i) => check(answers[i]!))
    found.compared += waiting.length
    waiting = []
  }
  for (const subject of subjects) {
    waiting.push(prepare(subject, random, found))
    if (waiting.length >= decksAtOnce) flush()
  }
  if (waiting.length > 0) flush()
  return found
}

function prepare({ name, given, settled }: Subject, random: Random, found: Agreement) {
  const { network, condition } = given.study
  const { nets, elements } = netlistOf(given, settled)
  let reference: number[] | null = null
  const deck: Deck = { elements: elements.map((e) => ({ ...e, a: String(e.a), b: String(e.b) })) }
  const points = [...network.unknownOf].filter(([, unknown]) => unknown >= 0)
  const note = (what: string, unit: Unit, ours: number, theirs: number) => {
    const off = Math.abs(ours - theirs)
    const size = Math.max(Math.abs(ours), Math.abs(theirs))
    const part = Number.isFinite(off) ? off / (relativeLimit * size + floor) : Infinity
    found.values++
    // From microvolts to megavolts (a gigohm to chassis), so told as a share.
    found.worst[unit] = Math.max(found.worst[unit], unit === 'V at 1 mA' ? off / Math.max(size, 1e-3) : off)
    if (part <= found.nearest) return
    found.nearest = part
    found.where = `${name}: ${what} ${ours} ${unit} here, ${theirs} ${unit} there`
  }
  if (!condition.battery) {
    const amps = 1e-3
    const into = random.pick(points)[1]
    const outOf = random.chance(0.3) ? -1 : random.pick(points)[1]
    deck.injected = { into: String(into + 1), outOf: String(outOf + 1), amps }
    const perAmp = unitCurrentIn(settled, into, outOf)
    return {
      deck,
      check: (answer: DeckAnswer) => {
        for (const [point, unknown] of points) {
          const ours = amps * at(perAmp, unknown)
          let theirs = answer.volts(String(unknown + 1))
          if (Math.abs(ours - theirs) > relativeLimit * Math.abs(theirs) + floor) {
            reference ??= solveBig(nets, elements, [into + 1, outOf + 1]).map(
              (volts) => amps * toDouble(volts),
            )
            theirs = reference[unknown + 1]!
            found.referred++
          }
          note(point, 'V at 1 mA', ours, theirs)
        }
      },
    }
  }
  return {
    deck,
    check: (answer: DeckAnswer) => {
      for (const [point, unknown] of points)
        note(point, 'V', voltsAt(settled, unknown), answer.volts(String(unknown + 1)))
      for (const { name: element, ohms } of elements) {
        const branch = network.branchIndex.get(element)
        // The next-to-nothing joint behind a pin is no element of the format; its current is its neighbours'.
        if (branch === undefined || ohms <= pinJointOhms) continue
        note(element, 'A', branchAmps(given, settled, branch), answer.amps(element))
      }
    },
  }
}

export function toldAgreement(
  what: string,
  { compared, values, worst, nearest, where, referred }: Agreement,
): string {
  const told = (x: number) => x.toExponential(1)
  return (
    `${what}: ${compared} circuits compared with ngspice, ${values} values; worst difference ${told(worst.V)} V, ` +
    `${told(worst.A)} A, ${told(worst['V at 1 mA'])} of the volts at 1 mA; nearest to the limit, ${told(nearest)} of it: ${where}` +
    (referred > 0 ? `; ${referred} values settled by 320 bits` : '')
  )
}
