import type { Mode } from '../document/sites'

/** One fault, put in on purpose: to operate a faulty circuit, to practise on, to test with. */
export interface PlantedFault {
  site: string
  mode: Mode
  /** Ohm in series (open, blown, resistive) or across (shorts); a plain value of the mode when left out. */
  ohms?: number
  /** The other wire of a short between wires. */
  other?: string
  /** The wire at whose end a splice fails; its first when left out. */
  wire?: string
  /** Volts of a weak battery. */
  volts?: number
}
