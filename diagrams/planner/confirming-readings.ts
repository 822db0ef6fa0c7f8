import { controlCombinations } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import { restCondition, type Condition } from '../document/condition-schema'
import { wiresByEnd } from '../document/ports'
import type { Probe, Reading, ReadingValue } from '../document/reading-schema'
import { refuseReading } from '../solver/legal-reading'
import type { ConfirmingReading } from './confirming-reading'
import { confirmingWords } from './confirming-words'
import { faultsOfFinding, ShownBy, type Finding } from './shown-by'
import { probesIn } from './probes-in'
import { resolution } from './split'

const combinationLimit = 8
/** How many times what a meter can tell apart must lie between the good circuit and the fault. */
const clearlyApart = 2
const mostJobs = 2
/** A fault counts where it moves a point by more than this, by the format's page. */
const feltFromVolts = 0.4

/**
 * Readings that prove a repair, in the order in which they are taken: what shows that the cause of a
 * blown fuse is gone, with that fuse still out; the best drop under load; what the circuit is there to do; and the
 * newest reading that was wrong before.
 */
export function confirmingReadings(
  circuit: Circuit,
  finding: Finding,
  readings: readonly Reading[] = [],
): ConfirmingReading[] {
  const faults = faultsOfFinding(circuit, finding)
  const all = new ShownBy(circuit, faults)
  // Of severities that are not known, those that do nothing were not what was found.
  const felt = faults.filter((_, i) => isFelt(circuit, all, i))
  const shown = felt.length === 0 || felt.length === faults.length ? all : new ShownBy(circuit, felt)
  const confirm = (
    probe: Probe,
    proves: ConfirmingReading['proves'],
    repeats?: number,
  ): ConfirmingReading | null => {
    if (refuseReading(circuit, probe)) return null
    const expected = shown.good(probe)
    if (expected === null) return null
    const withFault = typicalWrong(probe, expected, shown.faulty(probe))
    const base = { probe, expected, withFault, proves, ...(repeats === undefined ? {} : { repeats }) }
    return { ...base, says: confirmingWords(circuit, base) }
  }
  const wrong = readings.findLastIndex((reading) => {
    const good = shown.good(reading)
    return good !== null && areApart(reading, good, reading.value)
  })
  return [
    ...fusesOut(circuit, finding, shown).flatMap((fuse) => causeGone(circuit, fuse, confirm) ?? []),
    underLoad(circuit, finding, shown, confirm),
    ...jobsDone(circuit, confirm),
    wrong < 0 ? null : confirm(probeOf(readings[wrong]!), 'was-wrong', wrong),
  ].filter((one): one is ConfirmingReading => one !== null)
}

/** Whether a fault does anything, everything plugged in. */
function isFelt(circuit: Circuit, shown: ShownBy, fault: number): boolean {
  return drivenConditions(circuit).some((condition) =>
    probesIn(circuit, condition).some((probe) => {
      const good = shown.good(probe)
      const value = shown.faulty(probe)[fault]!
      if (good === null || value === null) return false
      return typeof good === 'number' && typeof value === 'number'
        ? probe.kind === 'volts' && Math.abs(good - value) > feltFromVolts
        : good !== value
    }),
  )
}

type Confirm = (probe: Probe, proves: ConfirmingReading['proves']) => ConfirmingReading | null

/** Fuses that the fault has blown, or that were found blown. */
function fusesOut(circuit: Circuit, { site, mode }: Finding, shown: ShownBy): string[] {
  const own = circuit.nodes.find(
    (node) => node.kind === 'fuse' && site === `part:${node.id}` && mode === 'blown',
  )
  return [...new Set([...(own ? [own.id] : []), ...shown.blown()])]
}

/** Ohms to ground at the side of the fuse where the fault shows best, the fuse pulled. */
function causeGone(circuit: Circuit, fuse: string, confirm: Confirm): ConfirmingReading | null {
  const wired = wiresByEnd(circuit)
  const found = controlCombinations(circuit, combinationLimit).flatMap((controls) =>
    [`${fuse}.out`, `${fuse}.in`].flatMap((red) => {
      if (!wired.has(red)) return []
      const condition: Condition = { ...restCondition, controls, unplugged: [fuse], battery: false }
      return confirm({ kind: 'ohms', red, black: 'chassis', condition }, 'cause-gone') ?? []
    }),
  )
  return found.reduce<ConfirmingReading | null>((a, b) => (a && marginOf(a) >= marginOf(b) ? a : b), null)
}

/** The volts reading, everything plugged in, in which the fault stood out most; a drop across its place comes first. */
function underLoad(
  circuit: Circuit,
  finding: Finding,
  shown: ShownBy,
  confirm: Confirm,
): ConfirmingReading | null {
  let best: { probe: Probe; score: number } | null = null
  for (const condition of drivenConditions(circuit))
    for (const probe of [...acrossSite(circuit, finding.site, condition), ...probesIn(circuit, condition)]) {
      if (probe.kind !== 'volts') continue
      const good = shown.good(probe)
      if (typeof good !== 'number') continue
      const margins = shown.faulty(probe).map((value) => (value === null ? 0 : margin(probe, good, value)))
      // A drop between two points needs no steady battery: it is worth half as much again.
      const score = Math.min(...margins) * (probe.black === 'chassis' ? 1 : 1.5)
      if (score >= clearlyApart && score > (best?.score ?? 0)) best = { probe, score }
    }
  return best && confirm(best.probe, 'under-load')
}

/** Loads that would not have done their job, or modules that would not have seen their input. */
function jobsDone(circuit: Circuit, confirm: Confirm): ConfirmingReading[] {
  const all = drivenConditions(circuit).flatMap((condition) =>
    probesIn(circuit, condition).flatMap((probe) =>
      probe.kind === 'works' || probe.kind === 'sees' ? (confirm(probe, 'job-done') ?? []) : [],
    ),
  )
  const telling = all.filter(({ withFault }) => withFault !== null)
  const works = telling.filter(({ probe, expected }) => probe.kind === 'works' && expected === true)
  // Where the fault leaves every load at work, the load is still looked at: it is what the repair is for.
  const anyLoad = all.filter(({ probe, expected }) => probe.kind === 'works' && expected === true)
  const pool = [works, telling, anyLoad].find((list) => list.length > 0) ?? []
  const subjects = new Set<string>()
  return pool
    .filter(({ probe }) => {
      const subject = probe.kind === 'works' ? probe.node : probe.kind === 'sees' ? probe.pin : ''
      return subjects.size < mostJobs && !subjects.has(subject) && subjects.add(subject)
    })
    .slice(0, mostJobs)
}

function drivenConditions(circuit: Circuit): Condition[] {
  // Controls moved first: there the circuit is under load.
  return controlCombinations(circuit, combinationLimit)
    .toReversed()
    .map((controls) => ({ ...restCondition, controls }))
}

function acrossSite(circuit: Circuit, site: string, condition: Condition): Probe[] {
  const wire = site.startsWith('wire:') && circuit.wires.find((w) => `wire:${w.id}` === site)
  return wire ? [{ kind: 'volts', red: wire.from, black: wire.to, condition }] : []
}

/** What the fault shows where it is wrong; null where some severity of it shows what the good circuit shows. */
function typicalWrong(
  probe: Probe,
  expected: ReadingValue,
  values: readonly (ReadingValue | null)[],
): ReadingValue | null {
  if (values.length === 0 || !values.every((value) => value !== null && areApart(probe, expected, value)))
    return null
  return values[values.length >> 1]!
}

function areApart(probe: Probe, good: ReadingValue, value: ReadingValue): boolean {
  return margin(probe, good, value) >= clearlyApart
}

/** How far a value is from the good one, in what a meter and real parts leave in doubt. */
function margin(probe: Probe, good: ReadingValue, value: ReadingValue): number {
  if (typeof good !== 'number' || typeof value !== 'number') return good === value ? 0 : 100
  return Math.abs(good - value) / Math.min(resolution(probe.kind, good), resolution(probe.kind, value))
}

function marginOf({ probe, expected, withFault }: ConfirmingReading): number {
  return withFault === null ? -1 : margin(probe, expected, withFault)
}

function probeOf(reading: Reading): Probe {
  switch (reading.kind) {
    case 'volts':
    case 'ohms':
      return { kind: reading.kind, red: reading.red, black: reading.black, condition: reading.condition }
    case 'amps':
      return { kind: 'amps', wire: reading.wire, condition: reading.condition }
    case 'works':
      return { kind: 'works', node: reading.node, condition: reading.condition }
    case 'sees':
      return { kind: 'sees', pin: reading.pin, condition: reading.condition }
  }
}
