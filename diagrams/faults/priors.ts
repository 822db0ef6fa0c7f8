import type { Circuit } from '../document/circuit-schema'
import type { Mode } from '../document/sites'
import type { Odds } from './odds-schema'
import { partClassOf, type PartClass } from './part-class'
import type { PriorKind } from './request'

/** Share of vehicles with a complaint and nothing wrong in this circuit. A guess, as are all weights here. */
export const noFaultPrior = 0.1

/**
 * The `trade` table: relative odds of one way to fail at one place. Contacts over wires, opens over shorts; weights of the
 * engine's page (no published frequencies found; common practice, no source).
 */
export const tradeTable: Readonly<Record<PartClass, Readonly<Partial<Record<Mode, number>>>>> = {
  wire: {
    open: 1,
    resistive: 0.7,
    'short-to-ground': 0.25,
    'short-to-supply': 0.25,
    'short-to-wire': 0.25,
  },
  contact: { open: 3, resistive: 4 },
  splice: { open: 0.5, resistive: 1 },
  ground: { open: 1, resistive: 3 },
  fuse: { blown: 1.5, resistive: 0.5 },
  load: { open: 3, resistive: 0.3, shorted: 0.3 },
  resistor: { open: 0.5, resistive: 0.5, shorted: 0.3 },
  diode: { open: 0.5, resistive: 0.5, shorted: 0.3 },
  'switch-contact': { 'stuck-open': 1, 'stuck-closed': 0.5, resistive: 1.2 },
  'relay-coil': { open: 1, shorted: 0.3 },
  'relay-contact': { 'stuck-open': 1.2, 'stuck-closed': 0.5, resistive: 1 },
  pin: { open: 0.5, resistive: 0.5, dead: 0.6, 'stuck-on': 0.6 },
  module: { dead: 0.3 },
  battery: { open: 0.5, resistive: 0.5, shorted: 0.3, weak: 1 },
  feed: { open: 0.5, resistive: 0.5 },
}

/** Weight of a way to fail of a class: as the organisation found it, else as the trade has it. */
export function classWeight(name: PartClass, mode: Mode, odds?: Odds): number {
  return odds?.classes[name]?.[mode] ?? tradeTable[name][mode] ?? 0.5
}

/**
 * Relative odds of one mode of one site. `trade`: those of the organisation, where given, over the trade's own;
 * `even`: all alike.
 */
export function modeWeight(circuit: Circuit, site: string, mode: Mode, kind: PriorKind, odds?: Odds): number {
  if (kind === 'even') return 1
  const own = odds && Object.hasOwn(odds.sites, site) ? odds.sites[site]![mode] : undefined
  return own ?? classWeight(partClassOf(circuit, site), mode, odds)
}
