/** Relays and modules are looked at a little eager and a little reluctant: all that tolerances can do to them. */
export const eager = 0.89
export const reluctant = 1.12
