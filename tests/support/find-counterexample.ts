import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { neighbourWires, type Mode, type Site } from '@/diagrams/document/sites'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { blownPlainly, showsPlainly } from './plain-faults'
import { shownPlainly, type Shown } from './plain-reading'
import { settlePlainly, type Factors, type Solved } from './plain-solver'
import type { Random } from './random'

/** A fault of a site, on a vehicle within the page's tolerances, that shows and gives every reading. */
export interface Counterexample {
  fault: PlantedFault
  restingVolts: number
  chargingVolts: number
  parts: Map<string, number>
}

interface Trial {
  fault: PlantedFault
  /** Position between the ends of its severities, 0 to 1. */
  at: number
  resting: number
  charging: number
  parts: Map<string, number>
  blown: ReadonlySet<string>
}

const scan = 14
const finalists = 3
const steps = 14

/**
 * Looks for a fault of a site that the readings do not rule out: over modes, severities, battery, parts
 * within 5 % and the meter's limits, with a solver of its own. Scans severities with the parts as drawn,
 * then pushes battery, severity and parts of the nearest ones towards the readings. Finding none proves
 * nothing; finding one does.
 */
export function findCounterexample(
  circuit: Circuit,
  site: Site,
  readings: readonly Reading[],
  random: Random,
): Counterexample | null {
  const near: { trial: Trial; off: number }[] = []
  for (const mode of site.modes)
    for (const variant of variantsOf(circuit, site.id, mode)) {
      const kind: PlantedFault = { site: site.id, mode, ...variant }
      const found: typeof near = []
      for (let i = 0; i <= (hasSeverity(mode) ? scan : 0); i++)
        for (const battery of [0.5, 0, 1]) {
          const trial = trialOf(circuit, kind, i / scan, battery)
          found.push({ trial, off: misfit(circuit, trial, readings) })
          // The battery stands wherever it likes in a weak one, and matters little far from the mark.
          if (mode === 'weak' || found.at(-1)!.off > 60) break
        }
      near.push(...found.toSorted((a, b) => a.off - b.off).slice(0, 2))
    }
  near.sort((a, b) => a.off - b.off)
  for (const { trial } of near.slice(0, finalists)) {
    const found = push(circuit, trial, readings, random)
    if (found) return found
  }
  return null
}

function variantsOf(circuit: Circuit, site: string, mode: Mode): Partial<PlantedFault>[] {
  if (mode === 'short-to-wire') return neighbourWires(circuit, site.slice(5)).map((other) => ({ other }))
  const splice = circuit.nodes.find((node) => node.kind === 'splice' && `part:${node.id}` === site)
  if (!splice) return [{}]
  const end = `${splice.id}.s`
  return circuit.wires.filter((w) => w.from === end || w.to === end).map((w) => ({ wire: w.id }))
}

const hasSeverity = (mode: Mode) => rangeOf(mode) !== null

/** The page's ranges; opens up to where no meter tells the difference. */
function rangeOf(mode: Mode): readonly [number, number] | null {
  if (mode === 'open' || mode === 'blown' || mode === 'stuck-open') return [1e9, 1e12]
  if (mode === 'resistive') return [0.5, 1e5]
  if (mode === 'weak') return [7, 11.8]
  return mode.startsWith('short') ? [0.01, 10] : null
}

function severe(kind: PlantedFault, at: number): PlantedFault {
  const range = rangeOf(kind.mode)
  if (!range) return kind
  const [low, high] = range
  if (kind.mode === 'weak') return { ...kind, volts: low + at * (high - low) }
  return { ...kind, ohms: low * (high / low) ** at }
}

function trialOf(circuit: Circuit, kind: PlantedFault, at: number, battery: number): Trial {
  const trial: Trial = {
    fault: severe(kind, at),
    at,
    resting: 11.8 + battery,
    charging: 13.5 + 1.3 * battery,
    parts: new Map(),
    blown: new Set(),
  }
  return { ...trial, blown: blownPlainly(circuit, factorsOf(trial, false), trial.fault) }
}

function factorsOf(trial: Trial, charging: boolean): Factors {
  return {
    part: (name) => trial.parts.get(name) ?? 1,
    battery: charging ? trial.charging / 14.15 : trial.resting / 12.6,
  }
}

/** Every reading under a trial; a condition that does not come to rest foretells nothing and is left out. */
function showAll(circuit: Circuit, trial: Trial, readings: readonly Reading[]): Shown[] {
  const solved = new Map<string, Solved | null>()
  return readings.flatMap((reading) => {
    const key = JSON.stringify(reading.condition)
    let found = solved.get(key)
    if (found === undefined) {
      const factors = factorsOf(trial, reading.condition.charging)
      found = settlePlainly(circuit, reading.condition, factors, trial.blown, trial.fault)
      solved.set(key, found)
    }
    return found ? [shownPlainly(circuit, trial.fault, reading, found)] : []
  })
}

const beyond = ({ value, low, high, unit }: Shown): number =>
  value < low ? (value - low) / unit : value > high ? (value - high) / unit : 0

/** Sum over readings of how far each lies beyond its limits, in limits, large ones softened. */
function misfit(circuit: Circuit, trial: Trial, readings: readonly Reading[]): number {
  return total(showAll(circuit, trial, readings))
}
function total(shown: readonly Shown[]): number {
  return shown.reduce((sum, one) => sum + Math.log1p(Math.abs(beyond(one))), 0)
}

/** Pushes parts, battery and severity towards the readings, keeping what helps. */
function push(
  circuit: Circuit,
  start: Trial,
  readings: readonly Reading[],
  random: Random,
): Counterexample | null {
  let best = start
  let shown = showAll(circuit, best, readings)
  let off = total(shown)
  let stride = 1
  for (let step = 0; step < steps && off > 0 && stride > 0.02; step++) {
    const moves = candidates(best, shown, stride, random)
    let better = false
    for (const move of moves) {
      const after = showAll(circuit, move, readings)
      const offAfter = total(after)
      if (offAfter < off - 1e-12) [best, shown, off, better] = [move, after, offAfter, true]
    }
    if (!better) stride /= 3
  }
  if (off > 0) return null
  // The fuses that these parts and this battery blow have to be the same, and the fault has to show.
  const blown = blownPlainly(circuit, factorsOf(best, false), best.fault)
  const same = blown.size === best.blown.size && [...blown].every((fuse) => best.blown.has(fuse))
  if (!same && misfit(circuit, { ...best, blown }, readings) > 0) return null
  if (!showsPlainly(circuit, factorsOf(best, false), blown, best.fault)) return null
  return { fault: best.fault, restingVolts: best.resting, chargingVolts: best.charging, parts: best.parts }
}

function candidates(best: Trial, shown: readonly Shown[], stride: number, random: Random): Trial[] {
  const clamp = (x: number, low: number, high: number) => Math.min(high, Math.max(low, x))
  const moves: Trial[] = []
  // Parts: against the readings that are off, together and each alone, weighed by how far they are off.
  const wrong = shown.filter((one) => beyond(one) !== 0)
  const pull = (of: readonly Shown[]) => {
    const sum = new Map<string, number>()
    for (const one of of)
      for (const [part, slope] of one.slope())
        sum.set(part, (sum.get(part) ?? 0) - (Math.sign(beyond(one)) * slope) / one.unit)
    return sum
  }
  for (const group of [wrong, [random.pick(wrong)]]) {
    const parts = new Map(best.parts)
    for (const [part, force] of pull(group)) {
      if (Math.abs(force) < 1e-9) continue
      parts.set(part, clamp((parts.get(part) ?? 1) + Math.sign(force) * 0.05 * stride, 0.95, 1.05))
    }
    moves.push({ ...best, parts })
  }
  for (const sign of [-1, 1]) {
    const resting = clamp(best.resting + sign * 0.5 * stride, 11.8, 12.8)
    const charging = clamp(best.charging + sign * 0.65 * stride, 13.5, 14.8)
    moves.push({ ...best, resting, charging })
    if (!hasSeverity(best.fault.mode)) continue
    const at = clamp(best.at + (sign * stride) / scan, 0, 1)
    moves.push({ ...best, at, fault: severe(best.fault, at) })
  }
  return moves
}
