/** A fused lead with its fuse and clips, ohm (common practice, no source). */
export const fusedLeadOhms = 0.05
/** A test lamp of about 3 W, ohm. */
export const testLampOhms = 48
/** Below this what is put in is a lead, not a load. */
export const leadBelowOhms = 1
/** Fuse of a lead that the planner asks for, A (common practice, no source). */
export const leadFuseAmps = 10
/** No lead with a fuse for a vehicle's small circuits carries more, A: beyond it, a supply is joined to ground. */
export const mostLeadAmps = 40
