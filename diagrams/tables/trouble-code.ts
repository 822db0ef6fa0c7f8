import { codeLetters, codeRanges, powertrainAreas } from './code-structure'
import { failureTypeMeaning } from './failure-types'

/** A trouble code taken apart. */
export interface TroubleCode {
  /** Without its failure type: "B1042". */
  code: string
  /** Two hexadecimal digits, or null when the code was given without. */
  failureType: string | null
}

const form = /^([PCBU][0-3][0-9A-F]{3})(?:-([0-9A-F]{2}))?$/

/** "B1042" or "B1042-13"; null for anything else. */
export function parseTroubleCode(text: string): TroubleCode | null {
  const match = form.exec(text)
  return match ? { code: match[1]!, failureType: match[2] ?? null } : null
}

/** The code that two or three bytes stand for, high byte first; null for other numbers of bytes. */
export function troubleCodeOfBytes(bytes: readonly number[]): string | null {
  if (bytes.length < 2 || bytes.length > 3) return null
  if (!bytes.every((byte) => Number.isInteger(byte) && byte >= 0 && byte <= 255)) return null
  const [high, low, type] = bytes as [number, number, number?]
  const digits = (((high & 0x3f) << 8) | low).toString(16).toUpperCase().padStart(4, '0')
  const tail = type === undefined ? '' : `-${type.toString(16).toUpperCase().padStart(2, '0')}`
  return `${codeLetters[high >> 6]!.letter}${digits}${tail}`
}

/** "body, manufacturer": the system and who gives out the code; "circuit open" and the like for its failure type. */
export function describeTroubleCode({ code, failureType }: TroubleCode): {
  system: string
  area: string | null
  controlledBy: string
  failure: string | null
} {
  const range = codeRanges.find(({ from, to }) => code >= from && code <= to)!
  return {
    system: codeLetters.find(({ letter }) => letter === code[0])!.system,
    area: powertrainAreas[code.slice(0, 3)] ?? null,
    controlledBy: range.controlledBy,
    failure: failureType === null ? null : failureTypeMeaning(failureType),
  }
}
