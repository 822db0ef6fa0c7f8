import type { Circuit } from '../document/circuit-schema'
import { siteName, type Mode } from '../document/sites'
import type { ModeAnswer } from './answer'
import { aboutOhms, capital } from './value-words'

/**
 * What is wrong, and where, as the head of a sentence without its full stop: "Open at C12 cavity 3",
 * "Bad joint at G6: about 1.8 ohm", "F12 has blown".
 */
export function faultWords(
  circuit: Circuit,
  site: string,
  fault: Pick<ModeAnswer, 'mode' | 'ohms' | 'other'>,
): string {
  const name = siteName(circuit, site)
  const at = atSite(circuit, site)
  // How good a short is says little to whoever looks for it.
  const about = fault.ohms === null ? '' : `: ${aboutOhms(fault.ohms)}`
  switch (fault.mode) {
    case 'open':
      return `Open ${at}`
    case 'resistive':
      return `${capital(modeNoun(circuit, site, 'resistive'))} ${at}${about}`
    case 'short-to-ground':
      return `Short to ground ${at}`
    case 'short-to-supply':
      return `Short to supply ${at}`
    case 'short-to-wire':
      return `${capital(name)} touches ${fault.other ? siteName(circuit, `wire:${fault.other}`) : 'another wire'}`
    case 'shorted':
      return `${capital(name)} is shorted inside`
    case 'blown':
      return `${capital(name)} has blown`
    case 'weak':
      return `${capital(name)} is weak`
    case 'stuck-open':
      return `${capital(name)} stays open`
    case 'stuck-closed':
      return `${capital(name)} stays closed`
    case 'dead':
      return site.startsWith('module:') ? `${capital(name)} does not wake` : `${capital(name)} is dead`
    case 'stuck-on':
      return `${capital(name)} is stuck on`
  }
}

/** "in wire F12 to C7 cavity 2", "in the contact at M2 pin 3", "at G6". */
export function atSite(circuit: Circuit, site: string): string {
  const name = siteName(circuit, site)
  if (site.startsWith('wire:')) return `in ${name}`
  return name.startsWith('contact at ') ? `in the ${name}` : `at ${name}`
}

/** One way to fail in few words, after the place's name or in a list. */
export function modeNoun(circuit: Circuit, site: string, mode: Mode): string {
  switch (mode) {
    case 'resistive':
      return isJoint(circuit, site) ? 'bad joint' : 'high resistance'
    case 'short-to-ground':
      return 'short to ground'
    case 'short-to-supply':
      return 'short to supply'
    case 'short-to-wire':
      return 'touches another wire'
    case 'shorted':
      return 'shorted inside'
    case 'stuck-open':
      return 'stays open'
    case 'stuck-closed':
      return 'stays closed'
    case 'stuck-on':
      return 'stuck on'
    default:
      return mode
  }
}

/** Where two pieces of metal meet, as against the length of a wire or the inside of a part. */
function isJoint(circuit: Circuit, site: string): boolean {
  if (site.startsWith('contact:')) return true
  const node = circuit.nodes.find((n) => `part:${n.id}` === site)
  return node?.kind === 'ground' || node?.kind === 'splice' || node?.kind === 'fuse'
}
