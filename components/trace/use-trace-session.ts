import { useMemo, useState } from 'react'
import { pathOrder } from '@/diagrams/drawing/path-order'
import type { NextReading } from '@/diagrams/faults/answer'
import { useAnswer } from '@/lib/client/evaluator/use-answer'
import type { Trace } from '@/lib/shared/api/traces'
import type { Picked } from '../canvas/pick-at'
import { moduleInputs } from './meter/module-inputs'
import { useMeter } from './use-meter'
import { useTrace } from './use-trace'
import { verdictCounts } from './verdict-counts'

/** A trace being worked on: what was read, what the evaluator says of it, how the meter is set, which place is picked. */
export function useTraceSession(initial: Trace) {
  const work = useTrace(initial)
  const { trace, readings } = work
  // The edition a trace was started on never changes, so the circuit keeps its identity over every answer.
  const [circuit] = useState(initial.circuit.document)
  // What the shop found in other traces meanwhile is for the next visit: odds do not change under one's hands.
  const [odds] = useState(initial.odds)
  // Told once, at the start.
  const [symptoms] = useState(initial.symptoms)
  const codesKey = trace.codes.join(' ')
  const codes = useMemo(() => (codesKey === '' ? [] : codesKey.split(' ')), [codesKey])
  const { answer, current, failed, progress } = useAnswer(circuit, readings, codes, odds, symptoms)
  const started = readings.length > 0
  const done = trace.state === 'done'

  const [chosen, setChosen] = useState<{ next: NextReading; of: unknown } | null>(null)
  const offered = current && answer && !done ? answer.next : []
  const next = (chosen && chosen.of === answer ? chosen.next : offered[0]) ?? null
  const [askingCautions, setAskingCautions] = useState(
    circuit.cautions.length > 0 && initial.cautionsAnsweredAt === null && !done,
  )
  const [site, setSite] = useState<string | null>(null)
  const [entering, setEntering] = useState(false)

  const meter = useMeter(circuit, next, {
    mayEnter() {
      if (circuit.cautions.length === 0 || work.cautionsAnswered) return true
      setAskingCautions(true)
      return false
    },
    onEnter(reading) {
      work.enter(reading)
      setSite(null)
      setEntering(false)
    },
  })
  const legs = useMemo(
    () => pathOrder(circuit, new Map((answer?.sites ?? []).map((one) => [one.site, one.probability]))),
    [circuit, answer],
  )

  return {
    work,
    circuit,
    readings,
    answer,
    current,
    failed,
    progress,
    started,
    done,
    counts: verdictCounts(current ? answer : null),
    code: trace.codes[0] ?? null,
    next,
    others: offered.filter((other) => other !== next),
    located: answer?.outcome === 'located' || answer?.outcome === 'no-fault',
    meter,
    legs,
    site,
    setSite,
    askingCautions,
    setAskingCautions,
    /** A phone's whole screen for one reading is open. */
    entering,
    setEntering,
    setMeterFor(wanted: NextReading) {
      setChosen({ next: wanted, of: answer })
      meter.act({ do: 'set-for', next: wanted })
    },
    /** A finger on the sheet: a lead, a clamp, the load that is looked at, or a place to be told about. */
    pick(picked: Picked | null) {
      if (!picked) return setSite(null)
      if ('point' in picked) {
        if (done) return
        const sees = meter.state.kind === 'sees' && moduleInputs(circuit).includes(picked.point)
        return meter.act(
          sees ? { do: 'tap-pin', pin: picked.point } : { do: 'tap-point', point: picked.point },
        )
      }
      if ('wire' in picked) {
        if (meter.state.kind === 'amps' && !done) meter.act({ do: 'tap-wire', wire: picked.wire })
        return setSite(`wire:${picked.wire}`)
      }
      const load = circuit.nodes.some((node) => node.id === picked.node && node.kind === 'load')
      if (load && meter.state.kind === 'works' && !done) meter.act({ do: 'tap-load', node: picked.node })
      setSite(picked.site ?? placeOf(answer?.sites.map((one) => one.site) ?? [], picked.node))
    },
    /** To the neighbouring place in path order; once something is cleared, among those left. */
    walk(by: number) {
      const verdicts = new Map((answer?.sites ?? []).map((one) => [one.site, one.verdict]))
      const all = legs.flatMap((leg) => leg.sites)
      const left = all.filter((one) => verdicts.get(one) !== 'proved-good')
      const among = started && left.length > 0 ? left : all
      const at = site === null ? (by > 0 ? -1 : among.length) : among.indexOf(site)
      setSite(among[(at + by + among.length) % among.length] ?? null)
    },
  }
}

export type TraceSession = ReturnType<typeof useTraceSession>

/** The place a part stands for when it has only one. */
function placeOf(sites: readonly string[], node: string): string | null {
  const own = sites.filter((site) => {
    const rest = site.slice(site.indexOf(':') + 1)
    return !site.startsWith('wire:') && (rest === node || rest.startsWith(`${node}.`))
  })
  return own.find((site) => site === `part:${node}` || site === `contact:${node}`) ?? own[0] ?? null
}
