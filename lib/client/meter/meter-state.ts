import { type Condition, restCondition } from '@/diagrams/document/condition-schema'
import type { Probe } from '@/diagrams/document/reading-schema'
import type { NextReading } from '@/diagrams/faults/answer'
import { probeOfNext } from './probe-of-next'
import { cleanText, pressKey } from './typed-text'

export const meterKinds = ['volts', 'ohms', 'amps', 'works', 'sees'] as const
export type MeterKind = (typeof meterKinds)[number]
/** True for what a meter shows as a figure, not what an eye or a module reports. */
export function takesFigure(kind: MeterKind): boolean {
  return kind !== 'works' && kind !== 'sees'
}
export type Lead = 'red' | 'black'
export type AddedLead = Condition['added'][number]
/** The figures of a reading during which the harness is moved: as it stands, the least and the most. */
export const figures = ['value', 'low', 'high'] as const
export type Figure = (typeof figures)[number]

/** How the meter is set and what has been typed: everything the tray knows of a reading not yet logged. */
export interface MeterState {
  kind: MeterKind
  red: string | null
  black: string
  wire: string | null
  node: string | null
  /** An input of a module, as its live data shows it. */
  pin: string | null
  condition: Condition
  /** As typed: digits, a point, a minus, or OL. */
  text: string
  works: boolean | null
  sees: 'high' | 'low' | null
  /** While the harness is moved: the least and the most, as typed; null while it hangs still. */
  moved: { low: string; high: string } | null
  /** Which figure is being typed. */
  figure: Figure
  /** Which lead the next tapped point is for. */
  lead: Lead
}

export const restMeter: MeterState = {
  kind: 'volts',
  red: null,
  black: 'chassis',
  wire: null,
  node: null,
  pin: null,
  condition: restCondition,
  text: '',
  works: null,
  sees: null,
  moved: null,
  figure: 'value',
  lead: 'red',
}

export type MeterAction =
  | { do: 'choose-kind'; kind: MeterKind }
  | { do: 'pick-lead'; lead: Lead }
  | { do: 'put-lead'; lead: Lead; point: string }
  | { do: 'tap-point'; point: string }
  | { do: 'tap-wire'; wire: string }
  | { do: 'tap-load'; node: string }
  | { do: 'tap-pin'; pin: string }
  | { do: 'type'; text: string }
  | { do: 'press'; key: string }
  | { do: 'say-works'; works: boolean }
  | { do: 'say-sees'; sees: 'high' | 'low' }
  | { do: 'move-harness'; moved: boolean }
  | { do: 'pick-figure'; figure: Figure }
  | { do: 'put-in'; lead: AddedLead }
  | { do: 'take-out'; index: number }
  | { do: 'turn'; control: string; position: string }
  | { do: 'plug'; id: string; open: boolean }
  | { do: 'battery'; connected: boolean }
  | { do: 'charging'; charging: boolean }
  | { do: 'set-for'; next: NextReading }
  | { do: 'set-probe'; probe: Probe }
  | { do: 'logged' }

export function meterReducer(state: MeterState, action: MeterAction): MeterState {
  switch (action.do) {
    case 'choose-kind':
      return action.kind === state.kind ? state : { ...state, kind: action.kind, ...nothingTyped }
    case 'pick-lead':
      return { ...state, lead: action.lead }
    case 'put-lead':
      return putLead(state, action.lead, action.point)
    case 'tap-point':
      // Two taps set both leads: the first one is red, the second black, a third begins again.
      return putLead(onLeads(state), state.lead, action.point)
    case 'tap-wire':
      return { ...state, wire: action.wire }
    case 'tap-load':
      return { ...state, node: action.node }
    case 'tap-pin':
      return { ...state, pin: action.pin }
    case 'type':
      return withText(state, cleanText(action.text))
    case 'press':
      return withText(state, pressKey(shownText(state), action.key))
    case 'say-works':
      return { ...state, works: action.works }
    case 'say-sees':
      return { ...state, sees: action.sees }
    case 'move-harness':
      return { ...state, moved: action.moved ? { low: '', high: '' } : null, figure: 'value' }
    case 'pick-figure':
      return { ...state, figure: state.moved ? action.figure : 'value' }
    case 'put-in':
      return withCondition(state, { added: [...state.condition.added, action.lead] })
    case 'take-out':
      return withCondition(state, { added: state.condition.added.filter((_, i) => i !== action.index) })
    case 'turn':
      return withCondition(state, {
        controls: { ...state.condition.controls, [action.control]: action.position },
      })
    case 'plug': {
      const others = state.condition.unplugged.filter((id) => id !== action.id)
      return withCondition(state, { unplugged: action.open ? [...others, action.id] : others })
    }
    case 'battery':
      return withCondition(state, {
        battery: action.connected,
        charging: false,
      })
    case 'charging':
      return withCondition(state, { charging: action.charging })
    case 'set-for': {
      const probe = probeOfNext(action.next)
      return probe ? setForProbe(state, probe) : state
    }
    case 'set-probe':
      return setForProbe(state, action.probe)
    case 'logged':
      return { ...state, ...nothingTyped, lead: 'red' }
  }
}

const nothingTyped = {
  text: '',
  works: null,
  sees: null,
  moved: null,
  figure: 'value',
} as const satisfies Partial<MeterState>

/** The figure that stands in the window. */
export function shownText({ text, moved, figure }: Pick<MeterState, 'text' | 'moved' | 'figure'>): string {
  return moved && figure !== 'value' ? moved[figure] : text
}

function withText(state: MeterState, text: string): MeterState {
  const { moved, figure } = state
  return moved && figure !== 'value' ? { ...state, moved: { ...moved, [figure]: text } } : { ...state, text }
}

function onLeads(state: MeterState): MeterState {
  return state.kind === 'volts' || state.kind === 'ohms'
    ? state
    : { ...state, kind: 'volts', ...nothingTyped }
}

function putLead(state: MeterState, lead: Lead, point: string): MeterState {
  return lead === 'red' ? { ...state, red: point, lead: 'black' } : { ...state, black: point, lead: 'red' }
}

function withCondition(state: MeterState, change: Partial<Condition>): MeterState {
  return { ...state, condition: { ...state.condition, ...change } }
}

function setForProbe(state: MeterState, probe: Probe): MeterState {
  const set = { ...state, ...nothingTyped, condition: probe.condition, lead: 'red' as const }
  switch (probe.kind) {
    case 'volts':
    case 'ohms':
      return { ...set, kind: probe.kind, red: probe.red, black: probe.black }
    case 'amps':
      return { ...set, kind: 'amps', wire: probe.wire }
    case 'works':
      return { ...set, kind: 'works', node: probe.node }
    case 'sees':
      return { ...set, kind: 'sees', pin: probe.pin }
  }
}
