/**
 * Impact parameter (cm) of isotropic light that enters a sphere of radius `outer`. Half of the packets (u < 0.5) are spread evenly over
 * the area, as the light is; half as 1 / b^2, evenly within `closest`, so that dust far inside is met as often (composite biasing, Baes
 * et al. 2016, A&A 590, A55).
 */
export function impactParameter(outer: number, closest: number, u: number): number {
  const parts = impactParts(outer, closest)
  const part = (2 * u - 1) * parts
  let b = outer * Math.sqrt(2 * u)
  if (u >= 0.5) b = part < 1 ? closest * Math.sqrt(part) : closest * Math.exp(0.5 * (part - 1))
  return Math.min(b, outer * (1 - 1e-12))
}

/** Weight of a packet of that impact parameter, of either half: that of the mixture, 2 at most. */
export function impactWeight(outer: number, closest: number, b: number): number {
  const share = outer / Math.max(b, closest)
  return 2 / (1 + (share * share) / impactParts(outer, closest))
}

/** Of the second half 1 part lies within `closest`, the others outside. */
function impactParts(outer: number, closest: number): number {
  return 1 + 2 * Math.log(outer / closest)
}
