/** Figures of the circuit format's page. Ohm, volt, siemens. */
export const contactOhms = 0.005
export const closedContactOhms = 0.02
export const groundPinOhms = 0.005
export const fuseOhmAmps = 0.08
export const diodeOhms = 0.01
export const suppressionOhms = 680
/** Copper at 20 °C, ohm mm² per metre. */
export const copperOhmMm2PerMetre = 0.01724
/**
 * A pin's inner node is joined to its terminal by next to nothing, so that a pin can be opened as
 * a whole: below a microvolt at 10 A.
 */
export const pinJointOhms = 1e-7
/** Keeps a floating harness defined; 1e-9 would turn 100 floating unknowns into a false 10 Mohm. */
export const leakSiemens = 1e-11
export const voltmeterOhms = 10e6
export const ohmmeterLimitOhms = 40e6
export const nominalBatteryVolts = 12.6
export const nominalChargingVolts = 14.15
/** A load works from a fraction of this. */
export const worksReferenceVolts = 12
/** A fuse carries 1.35 times its rating for a while and no more. */
export const blowsAtRatingTimes = 1.35
export const openOhms = 1e9
/** Leads within this of chassis and of each other count as dead, volts. */
export const deadVolts = 0.05
