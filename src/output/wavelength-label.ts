import { unitText } from './draw/numbers.js'

const leastDigits = 3
const mostDigits = 17

/** A wavelength (cm) for people and file names: `0.55um`, `870um`, `1.3mm`, `21cm`, with at most `digits` significant digits. */
export function wavelengthLabel(wavelength: number, digits = leastDigits): string {
  const [size, unit] = [
    [1, 'cm'],
    [0.1, 'mm']
  ].find(([size]) => Number(wavelength.toPrecision(digits)) >= Number(size)) ?? [1e-4, 'um']
  return `${Number((wavelength / Number(size)).toPrecision(digits))}${unit}`
}

/** Labels of a list of wavelengths (cm): those that would be alike get as many digits as tell them apart. */
export function wavelengthLabels(wavelengths: number[]): string[] {
  return wavelengths.map((wavelength) => {
    for (let digits = leastDigits; digits < mostDigits; digits++) {
      const label = wavelengthLabel(wavelength, digits)
      if (wavelengths.every((other) => other === wavelength || wavelengthLabel(other, digits) !== label)) return label
    }
    return wavelengthLabel(wavelength, mostDigits)
  })
}

/** A label for people: `870um` becomes `870 µm`. */
export function spacedWavelength(label: string): string {
  return unitText(label.replace(/(?<=\d)(?=[a-z])/, ' '))
}
