import type { Circuit } from '../document/circuit-schema'
import { neighbourWires, sitesOf, type Mode } from '../document/sites'
import { alterationKey, withBlown, type Alteration } from '../solver/alteration'
import { blownFuses, casesAfter, drivingStudies, fuseBranch } from '../solver/blown-fuses'
import type { Case } from '../solver/case'
import { alterationOf, isShort, type FaultKind } from '../solver/fault-alteration'
import type { Network } from '../solver/network'
import type { Study } from '../solver/study'
import { goodShow, showsBy, type Show } from './shows'
import { possibleBlown } from './possible-blown'
import { severityGrid } from './severity-grid'
import type { Steps } from './steps'

/** A stretch of severities of one hypothesis, between two solved ones. */
export interface Cell {
  low: number
  high: number
  /** Part of the mode's odds that falls here; 0 for a cell kept only so that nothing is cleared too early. */
  share: number
}

/** One way in which one site can be at fault, with the fuses it has blown, over a range of severities. */
export interface Hypothesis {
  site: string
  mode: Mode
  other: string | null
  /** The wire at whose end a splice fails. */
  wire: string | null
  blows: string[]
  /** Part of its mode's odds: a splice's ends and a wire's neighbours share them. */
  part: number
  cells: Cell[]
  alteration(network: Network): Alteration
}

/** Moves of a point by more than this count as showing, volts. */
const showsAtVolts = 0.4
/** For clearing a site a little less is enough: tolerances may add what is missing. */
const nearlyShowsAtVolts = 0.3

/** Every hypothesis of a circuit that would show, one way to fail at a time. Nothing else counts as a fault. */
export function* hypothesesOf(circuit: Circuit, network: Network): Steps<Hypothesis[]> {
  const studies = drivingStudies(network)
  const good = goodShow(studies)
  const found: Hypothesis[] = []
  const ways = sitesOf(circuit).flatMap((site) => {
    // Modes of one site that change the same branch, an open and a bad joint, share their factorisations.
    const caches = new Map<string, Map<string, Case[]>>()
    return site.modes.flatMap((mode) => {
      const kinds = kindsOf(circuit, site.id, mode)
      const part = (mode === 'short-to-wire' ? 0.5 : 1) / kinds.length
      return kinds.map((kind) => ({ kind, part, caches }))
    })
  })
  for (const [done, { kind, part, caches }] of ways.entries()) {
    yield { stage: 'circuit', done, of: ways.length }
    for (const { blows, cells } of variants(network, studies, good, kind, caches))
      found.push({
        site: kind.site,
        mode: kind.mode,
        other: kind.other ?? null,
        wire: kind.wire ?? null,
        blows,
        part,
        cells,
        alteration: oncePerNetwork((in_) => withBlown(alterationOf(in_, kind), blows.map(fuseBranch))),
      })
    // What its site has kept is wanted no longer than its last way to fail.
    if (ways[done + 1]?.caches !== caches) caches.clear()
  }
  return found
}

/** Asked again and again, mostly of one network. */
function oncePerNetwork(find: (network: Network) => Alteration): (network: Network) => Alteration {
  let last: { network: Network; alteration: Alteration } | undefined
  return (network) => {
    if (last?.network !== network) last = { network, alteration: find(network) }
    return last.alteration
  }
}

function keptCases(key: string, caches: Map<string, Map<string, Case[]>>): Map<string, Case[]> {
  let found = caches.get(key)
  if (!found) caches.set(key, (found = new Map()))
  return found
}

/** A splice fails at any one of its wires; a wire touches any one of its neighbours. */
function kindsOf(circuit: Circuit, site: string, mode: Mode): FaultKind[] {
  if (mode === 'short-to-wire')
    return neighbourWires(circuit, site.slice(5)).map((other) => ({ site, mode, other }))
  const splice =
    site.startsWith('part:') && circuit.nodes.find((n) => n.kind === 'splice' && n.id === site.slice(5))
  if (splice) {
    const end = `${splice.id}.s`
    return circuit.wires
      .filter((w) => w.from === end || w.to === end)
      .map((w) => ({ site, mode, wire: w.id }))
  }
  return [{ site, mode }]
}

/** The same fault once for each set of fuses it blows somewhere in its range. */
function variants(
  network: Network,
  studies: Study[],
  good: Show[],
  kind: FaultKind,
  caches: Map<string, Map<string, Case[]>>,
): { blows: string[]; cells: Cell[] }[] {
  const grid = severityGrid(kind.mode)
  const plain = alterationOf(network, kind)
  const found = new Map<string, { blows: string[]; certain: boolean[]; possible: boolean[] }>()
  const cache = keptCases(alterationKey(plain), caches)
  const mark = (index: number, blows: string[], certain: boolean) => {
    const key = blows.toSorted().join(',')
    let entry = found.get(key)
    if (!entry) {
      entry = { blows, certain: grid.map(() => false), possible: grid.map(() => false) }
      found.set(key, entry)
    }
    entry.possible[index] = true
    if (certain) entry.certain[index] = true
  }
  const possible = (severity: number) => possibleBlown(network, studies, plain, severity, cache)
  if (!isShort(kind.mode) || network.fuses.length === 0) grid.forEach((_, index) => mark(index, [], true))
  else
    blownOver(grid, possible).forEach((sets, index) => {
      const certain = sets.length === 1 ? sets[0]! : blownFuses(network, studies, plain, grid[index]!, cache)
      mark(index, certain, true)
      for (const blows of sets) mark(index, blows, false)
    })
  return [...found.values()].flatMap(({ blows, certain, possible }) => {
    const cases = casesAfter(studies, plain, blows, cache)
    const moved = movesOver(
      grid,
      (severity) => showsBy(cases, good, severity, showsAtVolts),
      harsherUpward(kind.mode),
    )
    const cells: Cell[] = []
    const last = Math.max(1, grid.length - 1)
    for (let i = 0; i < last; i++) {
      const j = Math.min(i + 1, grid.length - 1)
      if (!possible[i] && !possible[j]) continue
      const most = Math.max(moved[i]!, moved[j]!)
      if (most <= nearlyShowsAtVolts) continue
      // Where the fuse gives way inside a cell, both outcomes share it.
      const share = (Number(certain[i]) + Number(certain[j])) / 2
      cells.push({ low: grid[i]!, high: grid[j]!, share: most > showsAtVolts ? share : 0 })
    }
    return cells.length > 0 ? [{ blows, cells }] : []
  })
}

/**
 * The sets of fuses that a short may blow at each severity. The milder the short, the less a fuse carries: what the
 * ends of a stretch both blow for certain is blown between them.
 */
function blownOver(grid: readonly number[], possible: (severity: number) => string[][]): string[][][] {
  const found: (string[][] | undefined)[] = grid.map(() => undefined)
  const at = (index: number) => (found[index] ??= possible(grid[index]!))
  const key = (sets: string[][]) => sets.map((set) => set.toSorted().join(',')).join('|')
  const between = (from: number, to: number) => {
    if (to - from < 2) return
    if (at(from).length === 1 && key(at(from)) === key(at(to))) {
      found.fill(at(from), from + 1, to)
      return
    }
    const middle = (from + to) >> 1
    at(middle)
    between(from, middle)
    between(middle, to)
  }
  between(0, grid.length - 1)
  return grid.map((_, index) => at(index))
}

/**
 * How much each severity shows. The harsher a fault, the more it moves, so the two places where it
 * begins to count are found by halving; between them the figure is the bound that was passed.
 */
function movesOver(
  grid: readonly number[],
  movesAt: (severity: number) => number,
  upward: boolean,
): number[] {
  const moves = new Array<number>(grid.length).fill(0)
  const index = (rank: number) => (upward ? grid.length - 1 - rank : rank)
  const known = new Map<number, number>()
  const at = (rank: number) => {
    let found = known.get(rank)
    if (found === undefined) known.set(rank, (found = movesAt(grid[index(rank)]!)))
    return found
  }
  // Rank 0 is the harshest.
  const lastAbove = (limit: number): number => {
    if (at(0) <= limit) return -1
    let [shows, hides] = [0, grid.length]
    while (hides - shows > 1) {
      const middle = (shows + hides) >> 1
      if (at(middle) > limit) shows = middle
      else hides = middle
    }
    return shows
  }
  const full = lastAbove(showsAtVolts)
  const nearly = lastAbove(nearlyShowsAtVolts)
  for (let rank = 0; rank <= Math.max(full, nearly); rank++)
    moves[index(rank)] = rank <= full ? Infinity : showsAtVolts
  return moves
}

/** A higher ohm is the harsher one, except for shorts; a lower battery is. */
function harsherUpward(mode: Mode): boolean {
  return !isShort(mode) && mode !== 'weak'
}
