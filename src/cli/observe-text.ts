import { relative } from 'node:path'
import type { ObservationFinding, ObservationRecord } from '../observe/observation-record.js'
import { shown, table, wavelengthText, withError } from './words.js'

/** What `observe` says at its end. */
export function observeText(record: ObservationRecord, folder: string): string {
  return [
    `${record.title}: ${record.run.title}`,
    ...table(record.observations.map((finding) => [finding.name, wavelengthText(finding.wavelengthUm), ...cells(finding)])),
    ...record.warnings.map((warning) => `  warning: ${warning}`),
    `Results are in ${relative('.', folder) || '.'}`,
    ''
  ].join('\n')
}

function cells(finding: ObservationFinding): string[] {
  switch (finding.kind) {
    case 'picture': {
      const kept = `${shown(finding.pictureJy, 4)} of ${shown(finding.fieldJy, 4)} Jy in the picture`
      return [`peak ${withError(finding.peak, Math.hypot(finding.peakNoise, finding.peakSigma))} ${finding.unit}`, kept]
    }
    case 'photometry':
      return [`${withError(finding.value, Math.hypot(finding.valueNoise, finding.valueSigma))} ${finding.unit}`]
    case 'visibilities':
      return [
        `${finding.baselines} baselines, ${finding.closurePhases} closure phases`,
        `${shown(finding.fluxJy, 4)} Jy in the field`
      ]
  }
}
