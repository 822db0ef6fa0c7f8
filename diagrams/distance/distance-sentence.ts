import type { FaultFraction } from './fault-fraction'

/** Above this share of the wire between the limits, a reading has said nothing worth a sentence. */
const worthlessShare = 0.9

export interface DistanceWords {
  /** False when the readings cannot say where along the wire: then `says` says so. */
  useful: boolean
  says: string
}

/**
 * "The short lies 1.32 m from C210 cavity 4, give or take 18 cm." Rounded outwards, so that the figures said hold
 * whatever the limits hold. Where the readings are worth nothing, a sentence that says how little they are worth.
 */
export function distanceWords(
  found: FaultFraction,
  lengthMetres: number,
  nearName: string,
  farName: string,
): DistanceWords {
  const share = found.high - found.low
  if (share >= worthlessShare) return { useful: false, says: uselessWords(found, lengthMetres) }
  const fromFar = found.method === 'one-end' ? found.low > 1 - found.high : found.value > 0.5
  const name = fromFar ? farName : nearName
  const metres = (fraction: number) => lengthMetres * (fromFar ? 1 - fraction : fraction)
  const [low, high] = [metres(found.low), metres(found.high)].toSorted((a, b) => a - b) as [number, number]
  if (found.method === 'one-end')
    return {
      useful: true,
      says: `The short lies at most ${metresWords(high, Math.ceil)} from ${name}. Ohms from the other end would say where.`,
    }
  const value = Math.round(100 * metres(found.value)) / 100
  const give = Math.max(high - value, value - low, 0)
  return {
    useful: true,
    says: `The short lies ${value.toFixed(2)} m from ${name}, give or take ${giveWords(give)}.`,
  }
}

function uselessWords({ method, reach, low, high }: FaultFraction, lengthMetres: number): string {
  const metres = Math.max(reach, (high - low) / 2) * lengthMetres
  const wire = `${metresWords(lengthMetres, Math.round)} of wire`
  const better =
    method === 'both-drops' || method === 'drop'
      ? 'A larger current or a finer millivolt range would say it.'
      : 'Millivolts along the wire at a known current would say it.'
  return method === 'one-end'
    ? `One reading in ohms leaves the whole ${wire}. ${better}`
    : `These readings are good to give or take ${metresWords(metres, Math.ceil)} on ${wire}: they do not say where the short lies. ${better}`
}

type Round = (value: number) => number

function metresWords(metres: number, round: Round): string {
  return `${(round(100 * metres) / 100).toFixed(2)} m`
}

/** Whole centimetres, and at least one: nobody finds a place by less. */
function giveWords(metres: number): string {
  // Rounding of the figure itself must not make the limits too narrow, nor a hair of arithmetic add a centimetre.
  const centimetres = Math.max(1, Math.ceil(100 * metres - 1e-6))
  return centimetres < 100 ? `${centimetres} cm` : `${(centimetres / 100).toFixed(2)} m`
}
