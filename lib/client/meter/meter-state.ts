import { type Condition, restCondition } from '@/diagrams/document/condition-schema'
import type { Probe } from '@/diagrams/document/reading-schema'
import type { NextReading } from '@/diagrams/faults/answer'

export const meterKinds = ['volts', 'ohms', 'amps', 'works'] as const
export type MeterKind = (typeof meterKinds)[number]
export type Lead = 'red' | 'black'

/** How the meter is set and what has been typed: everything the tray knows of a reading not yet logged. */
export interface MeterState {
  kind: MeterKind
  red: string | null
  black: string
  wire: string | null
  node: string | null
  condition: Condition
  /** As typed: digits, a point, a minus, or OL. */
  text: string
  works: boolean | null
  /** Which lead the next tapped point is for. */
  lead: Lead
}

export const restMeter: MeterState = {
  kind: 'volts',
  red: null,
  black: 'chassis',
  wire: null,
  node: null,
  condition: restCondition,
  text: '',
  works: null,
  lead: 'red',
}

export type MeterAction =
  | { do: 'choose-kind'; kind: MeterKind }
  | { do: 'pick-lead'; lead: Lead }
  | { do: 'put-lead'; lead: Lead; point: string }
  | { do: 'tap-point'; point: string }
  | { do: 'tap-wire'; wire: string }
  | { do: 'tap-load'; node: string }
  | { do: 'type'; text: string }
  | { do: 'press'; key: string }
  | { do: 'say-works'; works: boolean }
  | { do: 'turn'; control: string; position: string }
  | { do: 'plug'; id: string; open: boolean }
  | { do: 'battery'; connected: boolean }
  | { do: 'charging'; charging: boolean }
  | { do: 'set-for'; next: NextReading }
  | { do: 'set-probe'; probe: Probe }
  | { do: 'logged' }

const mostCharacters = 9

export function meterReducer(state: MeterState, action: MeterAction): MeterState {
  switch (action.do) {
    case 'choose-kind':
      return action.kind === state.kind ? state : { ...state, kind: action.kind, text: '', works: null }
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
    case 'type':
      return { ...state, text: cleanText(action.text) }
    case 'press':
      return { ...state, text: pressKey(state.text, action.key) }
    case 'say-works':
      return { ...state, works: action.works }
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
      return { ...state, text: '', works: null, lead: 'red' }
  }
}

function onLeads(state: MeterState): MeterState {
  return state.kind === 'volts' || state.kind === 'ohms' ? state : { ...state, kind: 'volts', text: '' }
}

function putLead(state: MeterState, lead: Lead, point: string): MeterState {
  return lead === 'red' ? { ...state, red: point, lead: 'black' } : { ...state, black: point, lead: 'red' }
}

function withCondition(state: MeterState, change: Partial<Condition>): MeterState {
  return { ...state, condition: { ...state.condition, ...change } }
}

function setForProbe(state: MeterState, probe: Probe): MeterState {
  const set = { ...state, condition: probe.condition, text: '', works: null, lead: 'red' as const }
  switch (probe.kind) {
    case 'volts':
    case 'ohms':
      return { ...set, kind: probe.kind, red: probe.red, black: probe.black }
    case 'amps':
      return { ...set, kind: 'amps', wire: probe.wire }
    case 'works':
      return { ...set, kind: 'works', node: probe.node }
    case 'sees':
      return state
  }
}

/** Null for what the meter of this screen cannot take. */
export function probeOfNext(next: NextReading): Probe | null {
  const { condition } = next
  switch (next.kind) {
    case 'volts':
    case 'ohms':
      return next.red && next.black ? { kind: next.kind, red: next.red, black: next.black, condition } : null
    case 'amps':
      return next.wire ? { kind: 'amps', wire: next.wire, condition } : null
    case 'works':
      return next.node ? { kind: 'works', node: next.node, condition } : null
    case 'sees':
      return null
  }
}

/** What the meter is set to measure; null while something is missing. */
export function probeOf(state: MeterState): Probe | null {
  const { kind, condition } = state
  switch (kind) {
    case 'volts':
    case 'ohms':
      return state.red === null ? null : { kind, red: state.red, black: state.black, condition }
    case 'amps':
      return state.wire === null ? null : { kind, wire: state.wire, condition }
    case 'works':
      return state.node === null ? null : { kind, node: state.node, condition }
  }
}

function pressKey(text: string, key: string): string {
  switch (key) {
    case 'erase':
      return text === 'OL' ? '' : text.slice(0, -1)
    case 'OL':
      return text === 'OL' ? '' : 'OL'
    case 'sign':
      if (text === 'OL') return text
      return text.startsWith('-') ? text.slice(1) : `-${text}`
    default:
      return cleanText(text === 'OL' ? key : text + key)
  }
}

/** Keeps what a meter can show: one minus in front, one point (a comma is taken as one), digits. */
export function cleanText(text: string): string {
  if (/^\s*o/i.test(text)) return 'OL'
  const plain = text.replaceAll(',', '.').replaceAll(/[^0-9.-]/g, '')
  const minus = plain.startsWith('-') ? '-' : ''
  const [whole = '', ...rest] = plain.replaceAll('-', '').split('.')
  return (minus + (rest.length > 0 ? `${whole}.${rest.join('')}` : whole)).slice(0, mostCharacters)
}
