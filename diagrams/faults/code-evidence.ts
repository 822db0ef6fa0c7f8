import type { Circuit, CodeEntry } from '../document/circuit-schema'
import { parseTroubleCode, type TroubleCode } from '../tables/trouble-code'
import { causeOf, failureTypeView, type Cause, type FailureTypeView } from './failure-type-view'
import type { FaultModel } from './fault-model'
import type { Hypothesis } from './hypothesis'
import { moduleViews, type View } from './module-view'
import { nothingReported, type ReportEvidence } from './report-evidence'

export type CodeEvidence = ReportEvidence

/** About one code in fifty points wrong (engine's page; no published figure found). */
const pointsWrong = 0.02
/** A module sees a level, and takes a parted wire for a joined one of the same level this often (a guess). */
const mistaken = 0.3
/** Where the module's own view says nothing of a listed place, the list itself is a softer hint. */
const unseen = 0.1

const kept = new WeakMap<FaultModel, Map<string, CodeEvidence | null>>()
const mostKept = 20

/**
 * Codes as evidence through the module's own view: a fault sets a code when it changes one of the module's pins, in
 * some driving condition, as a fault of the places listed with the code does and as its failure type names.
 * Evidence, not a filter: nothing is cleared by a code. Null when none of the codes says anything of this circuit.
 * Kept, since a trace asks again with every reading.
 */
export function codeEvidence(model: FaultModel, codes: readonly string[]): CodeEvidence | null {
  if (codes.length === 0) return null
  let known = kept.get(model)
  if (!known) kept.set(model, (known = new Map()))
  const key = codes.join()
  let found = known.get(key)
  if (found === undefined) {
    if (known.size >= mostKept) known.clear()
    known.set(key, (found = weighCodes(model, codes)))
  }
  return found
}

function weighCodes(model: FaultModel, codes: readonly string[]): CodeEvidence | null {
  const told = [...new Set(codes)].flatMap((text) => {
    const code = parseTroubleCode(text)
    const entries = code ? entriesOf(model.circuit, code) : []
    return code && entries.length > 0 ? [entries.map((entry) => setBy(model, entry, code))] : []
  })
  const speaking = told.filter((entries) => entries.some((entry) => entry !== null))
  if (speaking.length === 0) return null
  const found = nothingReported(model)
  for (const entries of speaking) {
    found.good += Math.log(pointsWrong)
    // A code without its type stands for any one of its entries.
    found.cells.forEach((cells, h) =>
      cells.forEach((_, c) => {
        cells[c]! += Math.log(Math.max(...entries.map((entry) => entry?.[h]![c] ?? pointsWrong)))
      }),
    )
  }
  return found
}

/** The entries a code names: those of its failure type, else those without one, else every entry of that code. */
function entriesOf(circuit: Circuit, { code, failureType }: TroubleCode): CodeEntry[] {
  const same = circuit.codes.filter((entry) => entry.code === code)
  if (failureType === null) return same
  const exact = same.filter((entry) => entry.failureType === failureType)
  if (exact.length > 0) return exact
  const open = same.filter((entry) => entry.failureType === undefined)
  return open.length > 0 ? open : same
}

/** Probability that each cell sets this code; null when its failure type says nothing of the circuit. */
function setBy(model: FaultModel, entry: CodeEntry, { failureType }: TroubleCode): Float64Array[] | null {
  const type = failureTypeView(failureType ?? entry.failureType ?? null)
  const listed = new Set(entry.sites)
  switch (type.of) {
    case 'nothing':
      return null
    case 'places':
      return listed.size === 0 ? null : setByPlaces(model, type, listed)
    case 'pin':
      return setByPin(model, type, listed, entry.code.startsWith('U'))
  }
}

function setByPin(
  model: FaultModel,
  type: Extract<FailureTypeView, { of: 'pin' }>,
  listed: ReadonlySet<string>,
  network: boolean,
): Float64Array[] | null {
  const views = moduleViews(model)
  const pins = pinsOf(model.circuit, listed)
  // A network code is set by the others when a module does not answer.
  const isNamed = ({ point, aspect }: View, cause: Cause) =>
    aspect === 'asleep' ? network : type[cause].includes(aspect) && (pins.size === 0 || pins.has(point))
  const key = (view: View) => `${view.point} ${view.aspect} ${view.condition}`
  /** Views that a fault of a listed place gives, by whether it parts or joins. */
  const watched = { parted: new Set<string>(), joined: new Set<string>() }
  const seen = new Set<string>()
  model.hypotheses.forEach(({ site, mode }, h) => {
    if (listed.size > 0 && !listed.has(site)) return
    const cause = causeOf(mode)
    for (const cell of views[h]!)
      for (const view of cell)
        if (isNamed(view, cause)) {
          watched[cause].add(key(view))
          seen.add(site)
        }
  })
  if (seen.size === 0 && listed.size === 0) return null
  // With no place listed, any pin may be meant: that says less.
  const not = listed.size > 0 && seen.size > 0 ? pointsWrong : unseen
  return model.hypotheses.map(({ site, mode, cells }, h) => {
    const cause = causeOf(mode)
    const other = cause === 'parted' ? 'joined' : 'parted'
    const onList = listed.has(site)
    const ofList = type[cause].length > 0 ? 1 - pointsWrong : mistaken
    return Float64Array.from(cells, (_, c) => {
      const keys = views[h]![c]!.map(key)
      if (keys.some((view) => watched[cause].has(view))) return 1 - pointsWrong
      if (keys.some((view) => watched[other].has(view))) return mistaken
      if (onList && seen.size === 0) return ofList
      return onList && !seen.has(site) ? unseen : not
    })
  })
}

/** By the list, whatever the pins show; a module's inside only by its own pins and itself. */
function setByPlaces(
  model: FaultModel,
  type: Extract<FailureTypeView, { of: 'places' }>,
  listed: ReadonlySet<string>,
): Float64Array[] {
  const views = type.asleep ? moduleViews(model) : null
  const modules = new Set([...pinsOf(model.circuit, listed)].map((point) => point.split('.')[0]!))
  for (const site of listed) if (site.startsWith('module:')) modules.add(site.slice('module:'.length))
  const meant = ({ site }: Hypothesis) =>
    type.inside
      ? (site.startsWith('pin:') || site.startsWith('module:')) &&
        (modules.size === 0 || modules.has(site.slice(site.indexOf(':') + 1).split('.')[0]!))
      : listed.has(site)
  return model.hypotheses.map((hypothesis, h) =>
    Float64Array.from(hypothesis.cells, (_, c) =>
      meant(hypothesis) || views?.[h]![c]!.some((view) => view.aspect === 'asleep')
        ? 1 - pointsWrong
        : unseen,
    ),
  )
}

/** Module pins that the listed places lie at: the pin itself, its contact, or a wire that ends there. */
function pinsOf(circuit: Circuit, listed: ReadonlySet<string>): Set<string> {
  const points = new Set(
    circuit.nodes.flatMap((node) =>
      node.kind === 'module' ? node.pins.map((pin) => `${node.id}.${pin.pin}`) : [],
    ),
  )
  const wires = new Map(circuit.wires.map((wire) => [wire.id, wire]))
  const found = new Set<string>()
  for (const site of listed) {
    const [what, rest = ''] = site.split(':')
    const wire = what === 'wire' ? wires.get(rest) : undefined
    for (const point of wire ? [wire.from, wire.to] : [rest]) if (points.has(point)) found.add(point)
  }
  return found
}
