/** Heat capacity per volume (erg/K/cm3) coefficient x T^power up to a temperature, K. */
const HEAT_CAPACITY: readonly { coefficient: number; power: number; upTo: number }[] = [
  { coefficient: 1.4e3, power: 2, upTo: 50 },
  { coefficient: 2.2e4, power: 1.3, upTo: 150 },
  { coefficient: 4.8e5, power: 0.68, upTo: 500 },
  { coefficient: 3.41e7, power: 0, upTo: Number.POSITIVE_INFINITY }
]

/**
 * Heat content of silicate, erg/cm3, at a temperature (K): integral of the heat capacity of Draine & Anderson (1985, ApJ 292, 494),
 * recalled; its pieces meet to 4 %. Carbon differs by less than a factor of two (Dwek 1986, ApJ 302, 363; recalled).
 */
export function heatContent(temperature: number): number {
  let [sum, from] = [0, 0]
  for (const { coefficient, power, upTo } of HEAT_CAPACITY) {
    const to = Math.min(temperature, upTo)
    sum += (coefficient * (to ** (power + 1) - from ** (power + 1))) / (power + 1)
    if (temperature <= upTo) break
    from = upTo
  }
  return sum
}

/**
 * Radius (cm) of a grain whose heat at a temperature (K) equals the energy of one photon (erg). Smaller ones never settle at that
 * temperature: they are cold most of the time, and hot after each photon.
 */
export function fluctuatingRadius(temperature: number, photonEnergy: number): number {
  return Math.cbrt((3 * photonEnergy) / (4 * Math.PI * heatContent(temperature)))
}
