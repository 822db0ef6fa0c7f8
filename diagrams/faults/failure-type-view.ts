import type { Mode } from '../document/sites'
import type { Aspect } from './module-view'

/** Whether a way to fail joins what should be apart, or parts what should be joined. */
export type Cause = 'parted' | 'joined'

/**
 * What a failure type speaks of.
 * - `pin`: a module found one of its pins so, because something was parted or joined.
 * - `places`: of the places listed with the code, not of a pin: mechanics, parts, the module's inside, the bus.
 * - `nothing`: not of the circuit at all: programming.
 */
export type FailureTypeView =
  | ({ of: 'pin' } & Record<Cause, readonly Aspect[]>)
  | { of: 'places'; asleep: boolean; inside: boolean }
  | { of: 'nothing' }

const any: readonly Aspect[] = ['low', 'high', 'no-current', 'over-current']
/** What an open does at a pin depends on which way the module holds it. */
const opens: readonly Aspect[] = ['low', 'high', 'no-current']

const pin = (parted: readonly Aspect[], joined: readonly Aspect[] = parted): FailureTypeView => ({
  of: 'pin',
  parted,
  joined,
})

/**
 * Failure types of SAE J2012-DA that say more than their group does. 14 and 15 name two faults each, of one level at the
 * module (common practice, no source): they say the level of the short, not which of the two it is.
 */
const byType: Readonly<Record<string, FailureTypeView>> = {
  '11': pin([], ['low', 'over-current']),
  '12': pin([], ['high', 'over-current']),
  '13': pin(opens, []),
  '14': pin(opens, ['low']),
  '15': pin(opens, ['high']),
  '16': pin(['low']),
  '17': pin(['high']),
  '18': pin(['no-current']),
  '19': pin(['over-current']),
  '1A': pin([], ['low', 'over-current']),
  '1B': pin(opens, []),
  '1C': pin(['low', 'high']),
  '1D': pin(['no-current', 'over-current']),
  '21': pin(['low', 'no-current']),
  '22': pin(['high', 'over-current']),
  '23': pin(['low']),
  '24': pin(['high']),
  '04': { of: 'places', asleep: false, inside: true },
  '05': { of: 'nothing' },
  '07': { of: 'places', asleep: false, inside: false },
  '08': { of: 'places', asleep: true, inside: false },
  '09': { of: 'places', asleep: false, inside: false },
}

/** The others of a group: 0x, 1x, 2x, 3x and 6x look at signals, which any change of a pin disturbs. */
const byGroup: Readonly<Record<string, FailureTypeView>> = {
  '0': pin(any),
  '1': pin(any),
  '2': pin(any),
  '3': pin(any),
  '4': byType['04']!,
  '5': byType['05']!,
  '6': pin(any),
  '7': byType['07']!,
  '8': byType['08']!,
  '9': byType['09']!,
}

/** What a failure type speaks of; without one, of a pin that is otherwise than it should be. Groups A to F are not given out: nothing. */
export function failureTypeView(failureType: string | null): FailureTypeView {
  if (failureType === null) return pin(any)
  return byType[failureType] ?? byGroup[failureType[0]!] ?? { of: 'nothing' }
}

export function causeOf(mode: Mode): Cause {
  return mode.startsWith('short') || mode === 'stuck-closed' || mode === 'stuck-on' ? 'joined' : 'parted'
}
