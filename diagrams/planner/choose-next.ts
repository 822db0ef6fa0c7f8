import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { placesOf } from './effort'
import { worthOf, type PlannedReading, type WeighedReading } from './scales'
import type { Bin } from './split'

const offered = 5
/** An alternative is worth at least this part of the best reading's bits per minute. */
const leastPart = 0.15
/** A quicker one takes at most this part of its minutes. */
const quickerPart = 0.7

/**
 * The best reading and its alternatives, best bits per minute first. An alternative differs from the
 * best where a person has a reason to prefer another: it is taken at another place, in another way,
 * without opening anything, or in less time. What is left of the list goes by bits per minute. The same
 * split at a higher price is no alternative. `given`: the best, where it is known by looking further ahead.
 */
export function chooseNext(
  circuit: Circuit,
  found: readonly WeighedReading[],
  given?: WeighedReading,
): PlannedReading[] {
  const best = given ?? mostWorth(found)
  if (!best) return []
  // The best comes first: what has more bits per minute but leads to a dearer end is no alternative.
  const ranked = found.filter((other) => other.rate <= best.rate).toSorted((a, b) => b.rate - a.rate)
  const chosen: WeighedReading[] = []
  const partitions = new Set<string>()
  const take = (reading: WeighedReading | undefined) => {
    if (!reading || chosen.length >= offered) return
    chosen.push(reading)
    partitions.add(keyOf(reading))
  }
  const keys = new Map<WeighedReading, string>()
  const keyOf = (reading: WeighedReading) => {
    let key = keys.get(reading)
    if (key === undefined) keys.set(reading, (key = partitionKey(reading.bins)))
    return key
  }
  const isNew = (reading: WeighedReading) => !chosen.includes(reading) && !partitions.has(keyOf(reading))
  const worth = ranked.filter((reading) => reading.rate >= leastPart * best.rate)
  const here = placeIds(circuit, best)
  const reasons: ((reading: WeighedReading) => boolean)[] = [
    (reading) => reading.minutes <= quickerPart * best.minutes,
    (reading) => placeIds(circuit, reading).every((id) => !here.includes(id)),
    (reading) => reading.probe.kind !== best.probe.kind,
    (reading) => disturbs(best.probe.condition) && !disturbs(reading.probe.condition),
  ]
  take(best)
  for (const reason of reasons) {
    // Another reason may already be served by one that was taken.
    if (chosen.slice(1).some(reason)) continue
    take(worth.find((reading) => reason(reading) && isNew(reading)))
  }
  // Then what is taken elsewhere or in another way than all so far, before more of the same.
  const ways = () => chosen.map((reading) => wayOf(circuit, reading))
  for (const reading of worth)
    if (chosen.length < offered && isNew(reading) && !ways().includes(wayOf(circuit, reading))) take(reading)
  for (const reading of ranked) if (chosen.length < offered && isNew(reading)) take(reading)
  return chosen
    .toSorted((a, b) => (a === best ? -1 : b === best ? 1 : b.rate - a.rate))
    .map(({ probe, bits, minutes, bins, row }) => ({ probe, bits, minutes, bins, row }))
}

function mostWorth(found: readonly WeighedReading[]): WeighedReading | undefined {
  return found.reduce<WeighedReading | undefined>(
    (a, b) => (a && worthOf(a) >= worthOf(b) ? a : b),
    undefined,
  )
}

function placeIds(circuit: Circuit, { probe }: WeighedReading): string[] {
  const places = placesOf(circuit, probe).map((place) => place.id)
  // What is seen or heard has no place for leads: it is its own.
  if (places.length > 0) return places
  return [probe.kind === 'works' ? probe.node : probe.kind === 'sees' ? probe.pin : '']
}

function wayOf(circuit: Circuit, reading: WeighedReading): string {
  return `${reading.probe.kind} ${placeIds(circuit, reading).toSorted().join(' ')}`
}

/** Whether something has to be taken apart or put in. */
function disturbs(condition: Condition): boolean {
  return condition.unplugged.length > 0 || !condition.battery || condition.added.length > 0
}

function partitionKey(bins: readonly Bin[]): string {
  return bins
    .map((bin) => bin.members.toSorted((a, b) => a - b).join(','))
    .toSorted()
    .join('|')
}
