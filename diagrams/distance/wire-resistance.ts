/*
 * Resistance of a conductor from what it is made of: R = ρ·l/A, and with temperature
 * R₂ = R₁ · (1 + α(t₂ − t₀)) / (1 + α(t₁ − t₀)), α given at t₀. Any handbook of electrical engineering; worked
 * examples of four of them are in the tests.
 */

/** Of copper at 20 °C, per kelvin (IEC 60287, table 1). */
export const copperPerKelvin = 0.00393
export const referenceCelsius = 20

/** Ohm of a conductor: resistivity in ohm mm² per metre, metres, mm². */
export function conductorOhms(ohmMm2PerMetre: number, lengthMetres: number, areaMm2: number): number {
  return (ohmMm2PerMetre * lengthMetres) / areaMm2
}

/** Copper of a stranded wire: mm² of one strand times their number. */
export function strandedAreaMm2(strands: number, strandMm2: number): number {
  return strands * strandMm2
}

/** What ohms measured at one temperature become at another, °C. */
export function ohmsAtTemperature(
  ohms: number,
  fromCelsius: number,
  toCelsius: number,
  { perKelvin = copperPerKelvin, givenAtCelsius = referenceCelsius } = {},
): number {
  const grows = (celsius: number) => 1 + perKelvin * (celsius - givenAtCelsius)
  return (ohms * grows(toCelsius)) / grows(fromCelsius)
}
