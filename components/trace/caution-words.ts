import type { Caution } from '@/diagrams/document/circuit-schema'

export const makerFirst = "The vehicle maker's service information and local rules come first."

/** What is said before the first reading of a circuit that carries the caution. Each ends with the maker's word. */
export const cautionWords: Record<Caution, { name: string; says: string }> = {
  'high-voltage': {
    name: 'High voltage',
    says: 'High-voltage system, above 60 V DC. Only trained and authorised people work on it: power it down by the maker’s procedure, prove it dead, wear insulating gloves that are in date. The maker’s information comes first.',
  },
  airbag: {
    name: 'Airbag',
    says: 'Airbag circuit. Disable it by the maker’s procedure first. Never put a meter on an igniter. The maker’s information comes first.',
  },
  fuel: {
    name: 'Fuel',
    says: 'Fuel vapour where this circuit runs. Air the place, keep sparks away, make and break connections with the battery off. The maker’s information comes first.',
  },
  'moving-parts': {
    name: 'Moving parts',
    says: 'This circuit moves parts that can start without warning. Keep hands, leads and sleeves clear, and pull the fuse before reaching in. The maker’s information comes first.',
  },
  'hot-surface': {
    name: 'Hot surfaces',
    says: 'This circuit heats parts that stay hot after it is switched off. Let them cool or keep leads and hands off. The maker’s information comes first.',
  },
}

/** Holds for every circuit. */
export const meterRules =
  'Ohms only with the circuit dead. Back-probe, do not spread a terminal. Fused leads for any bypass, never a bigger fuse.'
