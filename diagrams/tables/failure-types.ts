/** How sure a row is: "high" where several sources agree, "medium" where one is behind it or they differ in wording. */
export type Standing = 'high' | 'medium' | 'low'

export interface FailureType {
  /** Two hexadecimal digits, as printed after the hyphen of a code. */
  hex: string
  meaning: string
  standing: Standing
}

/**
 * Failure types of SAE J2012-DA (the ISO 15031-6 annex; the third byte of a code by ISO 14229-1), our own words. Looked up in at
 * least three independent public lists; the standard itself was not read. Left out because no list could be confirmed:
 * the details of groups 4x, 5x and 9x, and the whole of Fx.
 */
export const failureTypes: readonly FailureType[] = [
  { hex: '00', meaning: 'no sub type information', standing: 'high' },
  { hex: '01', meaning: 'general electrical failure', standing: 'high' },
  { hex: '02', meaning: 'general signal failure', standing: 'high' },
  { hex: '03', meaning: 'frequency or pulse-width modulated signal failure', standing: 'high' },
  { hex: '04', meaning: 'system internal failure', standing: 'high' },
  { hex: '05', meaning: 'system programming failure', standing: 'high' },
  { hex: '06', meaning: 'algorithm based failure', standing: 'high' },
  { hex: '07', meaning: 'mechanical failure', standing: 'high' },
  { hex: '08', meaning: 'bus signal or message failure', standing: 'high' },
  { hex: '09', meaning: 'component failure', standing: 'high' },
  { hex: '11', meaning: 'circuit short to ground', standing: 'high' },
  { hex: '12', meaning: 'circuit short to battery', standing: 'high' },
  { hex: '13', meaning: 'circuit open', standing: 'high' },
  { hex: '14', meaning: 'circuit short to ground or open', standing: 'high' },
  { hex: '15', meaning: 'circuit short to battery or open', standing: 'high' },
  { hex: '16', meaning: 'circuit voltage below threshold', standing: 'high' },
  { hex: '17', meaning: 'circuit voltage above threshold', standing: 'high' },
  { hex: '18', meaning: 'circuit current below threshold', standing: 'high' },
  { hex: '19', meaning: 'circuit current above threshold', standing: 'high' },
  { hex: '1A', meaning: 'circuit resistance below threshold', standing: 'high' },
  { hex: '1B', meaning: 'circuit resistance above threshold', standing: 'high' },
  { hex: '1C', meaning: 'circuit voltage out of range', standing: 'high' },
  { hex: '1D', meaning: 'circuit current out of range', standing: 'high' },
  { hex: '1E', meaning: 'circuit resistance out of range', standing: 'medium' },
  { hex: '1F', meaning: 'circuit intermittent', standing: 'high' },
  { hex: '21', meaning: 'signal amplitude too small', standing: 'high' },
  { hex: '22', meaning: 'signal amplitude too large', standing: 'high' },
  { hex: '23', meaning: 'signal stuck low', standing: 'high' },
  { hex: '24', meaning: 'signal stuck high', standing: 'high' },
  { hex: '25', meaning: 'signal shape or waveform wrong', standing: 'high' },
  { hex: '26', meaning: 'signal changes too slowly', standing: 'high' },
  { hex: '27', meaning: 'signal changes too fast', standing: 'high' },
  { hex: '28', meaning: 'signal bias or zero shift wrong', standing: 'high' },
  { hex: '29', meaning: 'signal invalid', standing: 'high' },
  { hex: '2A', meaning: 'signal stuck in range', standing: 'high' },
  { hex: '2B', meaning: 'signal cross coupled', standing: 'high' },
  { hex: '2F', meaning: 'signal erratic', standing: 'high' },
  { hex: '31', meaning: 'no signal', standing: 'medium' },
  { hex: '32', meaning: 'low time too short', standing: 'medium' },
  { hex: '33', meaning: 'low time too long', standing: 'medium' },
  { hex: '34', meaning: 'high time too short', standing: 'medium' },
  { hex: '35', meaning: 'high time too long', standing: 'medium' },
  { hex: '36', meaning: 'frequency too low', standing: 'medium' },
  { hex: '37', meaning: 'frequency too high', standing: 'medium' },
  { hex: '38', meaning: 'frequency wrong', standing: 'medium' },
  { hex: '39', meaning: 'too few pulses', standing: 'medium' },
  { hex: '3A', meaning: 'too many pulses', standing: 'medium' },
  { hex: '62', meaning: 'compared signals disagree', standing: 'medium' },
  { hex: '64', meaning: 'signal not plausible', standing: 'medium' },
  { hex: '71', meaning: 'actuator stuck', standing: 'medium' },
  { hex: '72', meaning: 'actuator stuck open', standing: 'medium' },
  { hex: '73', meaning: 'actuator stuck closed', standing: 'medium' },
  { hex: '87', meaning: 'message missing', standing: 'medium' },
  { hex: '88', meaning: 'bus off', standing: 'medium' },
]

/**
 * The first digit of a failure type and what the group is about. From the same lists, standing medium; Fx from memory
 * (left to the manufacturer).
 */
export const failureTypeGroups: Readonly<Record<string, string>> = {
  '0': 'general',
  '1': 'electrical circuit',
  '2': 'signal amplitude and shape',
  '3': 'timing and frequency',
  '4': 'internal electronics',
  '5': 'programming and configuration',
  '6': 'algorithm and comparison',
  '7': 'mechanical',
  '8': 'bus and message',
  '9': 'component and environment',
  F: 'left to the manufacturer',
}

const byHex = new Map(failureTypes.map((type) => [type.hex, type]))

/** "circuit short to ground or open"; the group's subject for a type not listed; null for what is no type at all. */
export function failureTypeMeaning(hex: string): string | null {
  return byHex.get(hex)?.meaning ?? (/^[0-9A-F]{2}$/.test(hex) ? (failureTypeGroups[hex[0]!] ?? null) : null)
}
