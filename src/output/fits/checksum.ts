const firstAlphanumeric = 0x30
const punctuation = new Set([0x3a, 0x3b, 0x3c, 0x3d, 0x3e, 0x3f, 0x40, 0x5b, 0x5c, 0x5d, 0x5e, 0x5f, 0x60])

/**
 * The 32-bit ones' complement sum of big-endian words (FITS Standard 4.0, section 4.4.2.7 and appendix J).
 * The length of `bytes` is a multiple of 4; `start` is a sum to go on from.
 */
export function onesComplementSum(bytes: Uint8Array, start = 0): number {
  let sum = start
  for (let i = 0; i < bytes.length; i += 4) {
    sum += bytes[i] * 0x1000000 + ((bytes[i + 1] << 16) | (bytes[i + 2] << 8) | bytes[i + 3])
    if (sum > 0xffffffff) sum -= 0xffffffff
  }
  return sum
}

/**
 * The 16 ASCII characters that, written in a CHECKSUM card, make an HDU whose sum was `sum` (with zeros written there)
 * add up to minus zero (FITS Standard 4.0, appendix J).
 */
export function encodeChecksum(sum: number): string {
  const complement = ~sum >>> 0
  const characters = new Uint8Array(16)
  for (let i = 0; i < 4; i++) {
    const byte = (complement >>> (24 - 8 * i)) & 0xff
    const quarters = new Array(4).fill((byte >> 2) + firstAlphanumeric)
    quarters[0] += byte % 4
    for (let pair = 0; pair < 4; pair += 2) {
      while (punctuation.has(quarters[pair]) || punctuation.has(quarters[pair + 1])) {
        quarters[pair]++
        quarters[pair + 1]--
      }
    }
    for (let j = 0; j < 4; j++) characters[(4 * j + i + 1) % 16] = quarters[j]
  }
  return String.fromCharCode(...characters)
}
