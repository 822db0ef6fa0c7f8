import { useMemo, useReducer, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { conditionKey, positionsIn } from '@/diagrams/document/condition'
import type { Condition } from '@/diagrams/document/condition-schema'
import { measure } from '@/diagrams/solver/meter'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import { type MeterAction, meterReducer, restMeter } from '@/lib/client/meter/meter-state'
import { probeOf } from '@/lib/client/meter/probe-of'
import { conditionWords } from '@/lib/client/meter/reading-words'

/** A circuit being operated: its condition, what it does, what it did before, and a meter on two points. */
export function useOperation(circuit: Circuit) {
  const [state, dispatch] = useReducer(meterReducer, restMeter)
  const [previous, setPrevious] = useState<Condition | null>(null)
  const { condition } = state
  const now = useMemo(() => solveOperatingPoint(circuit, condition), [circuit, condition])
  const before = useMemo(
    () => (previous ? solveOperatingPoint(circuit, previous) : null),
    [circuit, previous],
  )
  const probe = probeOf(state)
  const readout = useMemo(() => (probe ? measure(circuit, probe) : null), [circuit, probe])

  return {
    state,
    condition,
    positions: positionsIn(circuit, condition.controls),
    now,
    before: before?.ok ? before.value : null,
    beforeWords: previous ? changeWords(circuit, condition, previous) : '',
    readout,
    act(action: MeterAction) {
      const after = meterReducer(state, action)
      if (conditionKey(circuit, after.condition) !== conditionKey(circuit, condition)) setPrevious(condition)
      dispatch(action)
    },
  }
}

export type Operation = ReturnType<typeof useOperation>

/** What the other column of the points is: "SW5 released", or the whole condition when more than a control differs. */
function changeWords(circuit: Circuit, now: Condition, before: Condition): string {
  const here = positionsIn(circuit, now.controls)
  const there = positionsIn(circuit, before.controls)
  const turned = circuit.controls.filter((control) => here[control.id] !== there[control.id])
  const [only] = turned
  const sameRest =
    conditionKey(circuit, { ...now, controls: {} }) === conditionKey(circuit, { ...before, controls: {} })
  if (only && turned.length === 1 && sameRest) return `${only.label || only.id} ${there[only.id]}`
  return conditionWords(circuit, before)
}
