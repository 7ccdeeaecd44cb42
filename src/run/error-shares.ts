/** Temperatures may make this share of the error asked for. */
export const HEAT_SHARE = Math.SQRT1_2

/** What all noise together may reach of the error asked for: a quick look knows it to a few per cent. */
const AIM = 0.95

/** Share of the error asked for that is left for scattered light, in squares, where temperatures make the share `heat` of it. */
export function shareLeft(heat: number): number {
  return Math.sqrt(AIM * AIM - Math.min(heat, HEAT_SHARE) ** 2)
}
