import { useMemo, useReducer, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { NextOutcome, NextReading } from '@/diagrams/faults/answer'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { enterReading } from '@/lib/client/meter/enter-reading'
import { type MeterAction, meterReducer, type MeterState, restMeter } from '@/lib/client/meter/meter-state'
import { probeOf } from '@/lib/client/meter/probe-of'
import { probeOfNext } from '@/lib/client/meter/probe-of-next'
import { outcomeOf } from '@/lib/client/meter/outcome-of'
import { sameProbe } from '@/lib/client/meter/same-probe'
import { typedValue } from '@/lib/client/meter/typed-value'
import { newId } from '@/lib/client/new-id'

export interface Refusal {
  message: string
  meant: string | null
}

export interface MeterWork {
  state: MeterState
  act: (action: MeterAction) => void
  enter: () => void
  /** Why the reading as set cannot be taken, or why the one entered was refused. */
  refusal: Refusal | null
  /** True when the meter is set for the next split. */
  setForNext: boolean
  /** Outcomes of the next split while the meter is set for it, and the one the typed value falls in. */
  outcomes: readonly NextOutcome[]
  lit: NextOutcome | null
  /** A value is typed that falls in none of them. */
  outside: boolean
}

/** The meter of the tray: set, typed, refused or logged. */
export function useMeter(
  circuit: Circuit,
  next: NextReading | null,
  { mayEnter, onEnter }: { mayEnter: () => boolean; onEnter: (reading: Reading) => void },
): MeterWork {
  const [state, dispatch] = useReducer(meterReducer, restMeter)
  const [refused, setRefused] = useState<Refusal | null>(null)
  const { kind, red, black, wire, node, pin, condition } = state
  const probe = useMemo(
    () => probeOf({ ...restMeter, kind, red, black, wire, node, pin, condition }),
    [kind, red, black, wire, node, pin, condition],
  )
  const illegal = useMemo(() => (probe ? refuseReading(circuit, probe) : null), [circuit, probe])
  const setForNext = next !== null && sameProbe(circuit, probe, probeOfNext(next))
  const value = typedValue(state)
  const outcomes = setForNext ? next.outcomes : []
  const lit = outcomeOf(outcomes, value)

  const act = (action: MeterAction) => {
    setRefused(null)
    dispatch(action)
  }
  return {
    state,
    act,
    refusal: refused ?? (illegal ? { message: illegal.message, meant: null } : null),
    setForNext,
    outcomes,
    lit,
    outside: value !== null && outcomes.length > 0 && lit === null,
    enter() {
      if (!mayEnter()) return
      const entered = enterReading(circuit, state, newId())
      if (!entered.ok) {
        setRefused(entered)
        // The figure that is missing or wrong is the one to type next.
        if (entered.about !== 'leads' && entered.about !== 'condition')
          dispatch({ do: 'pick-figure', figure: entered.about })
        return
      }
      setRefused(null)
      onEnter(entered.reading)
      dispatch({ do: 'logged' })
    },
  }
}
