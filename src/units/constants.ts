/**
 * Physical and astronomical constants in cgs.
 *
 * References: CODATA 2018 (Tiesinga et al. 2021, Rev. Mod. Phys. 93, 025010), whose h, k and c are exact by the 2019 SI;
 * IAU 2012 Resolution B2 (astronomical unit); IAU 2015 Resolution B2 (parsec) and B3 (nominal solar and planetary values,
 * Prsa et al. 2016, AJ 152, 41). Derived values are derived here.
 */

/** Speed of light in vacuum, cm/s; exact. */
export const LIGHT_SPEED = 2.99792458e10

/** Planck constant h, erg s; exact. */
export const PLANCK = 6.62607015e-27

/** Electronvolt, erg; exact. */
export const ELECTRONVOLT = 1.602176634e-12

/** Boltzmann constant k, erg/K; exact. */
export const BOLTZMANN = 1.380649e-16

/** Stefan-Boltzmann constant 2 pi^5 k^4 / (15 h^3 c^2), erg/s/cm2/K4; derived. */
export const STEFAN_BOLTZMANN = (2 * Math.PI ** 5 * BOLTZMANN ** 4) / (15 * PLANCK ** 3 * LIGHT_SPEED ** 2)

/** Newtonian constant of gravitation, cm3/g/s2; CODATA 2018, standard uncertainty 1.5e-12 (6.6743(15)e-8). */
const GRAVITATION = 6.6743e-8

/** Astronomical unit, cm; IAU 2012 B2, exact. */
export const AU = 1.495978707e13

/** Parsec, 648000/pi au, cm; IAU 2015 B2. */
export const PARSEC = (648000 / Math.PI) * AU

/** Nominal solar radius, cm; IAU 2015 B3. */
export const SOLAR_RADIUS = 6.957e10

/** Nominal solar luminosity, erg/s; IAU 2015 B3. */
export const SOLAR_LUMINOSITY = 3.828e33

/** Solar mass, g: nominal GM (IAU 2015 B3, 1.3271244e26 cm3/s2) over G. */
export const SOLAR_MASS = 1.3271244e26 / GRAVITATION

/** Mass of Jupiter, g: nominal GM (IAU 2015 B3, 1.2668653e23 cm3/s2) over G. */
export const JUPITER_MASS = 1.2668653e23 / GRAVITATION

/** Mass of the Earth, g: nominal GM (IAU 2015 B3, 3.986004e20 cm3/s2) over G. */
export const EARTH_MASS = 3.986004e20 / GRAVITATION

/** Nominal equatorial radius of the Earth, cm; IAU 2015 B3. */
export const EARTH_RADIUS = 6.3781e8

/** Jansky, erg/s/cm2/Hz; 1e-26 W/m2/Hz by definition. */
export const JANSKY = 1e-23

/** Flux density of magnitude 0 in the AB system, erg/s/cm2/Hz: m = -2.5 lg f - 48.60 (Oke & Gunn 1983, ApJ 266, 713). */
export const AB_ZERO_FLUX = 10 ** (-48.6 / 2.5)
