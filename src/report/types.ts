/** What a report tells, whatever it is about; sections without content are left out of the page. */
export interface ReportContent {
  title: string
  /** One sentence below the title. */
  summary: string
  warnings: string[]
  pictures: PictureData[]
  charts: ChartSection[]
  tables: TableSection[]
  /** Texts shown whole, such as the scene. */
  texts: { heading: string; name: string; text: string }[]
  reproduce: { commands: string[]; remarks: string[]; inputs: { file: string; sha256: string }[] }
}

/** Images of one camera or observation, in the unit and the order of their FITS file. */
export interface PictureData {
  heading: string
  /** Relative to the folder: where all values are. */
  file: string
  width: number
  height: number
  /** Side of a pixel, arcsec, and a distance of 1 arcsec in au. */
  pixel: [number, number]
  auPerArcsec: number
  wavelengths: string[]
  planes: { name: string; meaning: string; sigma?: string }[]
  /** Base64 of little-endian 32-bit reals for each plane and wavelength, rows from south to north; by the plane's name. */
  values: Record<string, string[]>
  units: ReportUnit[]
  /** Full widths at half maximum, arcsec, and position angle, deg. */
  beam?: { major: number; minor: number; positionAngle: number }
  /** What this page leaves out. */
  notes: string[]
}

/** A unit: its size in cgs at each wavelength, or, of magnitudes, their zero point. The first of a list is that of the values. */
export interface ReportUnit {
  name: string
  kind: 'linear' | 'magnitude'
  cgs: number[]
}

export interface ChartSection {
  heading: string
  charts: ChartData[]
  /** PNG, where there is no chart. */
  pictures: { alt: string; base64: string }[]
  tables: TableSection[]
}

/** Curves over a common axis; gaps are null. */
export interface ChartData {
  title: string
  /** Relative to the folder: where the numbers are. */
  file: string
  x: { label: string; unit: string; values: number[] }
  y: { label: string; units: ReportUnit[] }
  series: { name: string; values: (number | null)[]; sigma?: (number | null)[]; look: 'line' | 'points' }[]
  log: { x: boolean; y: boolean }
}

export interface TableSection {
  heading: string
  columns: string[]
  rows: string[][]
  note?: string
}

/** What the script of the page finds in it. */
export interface PageData {
  pictures: PictureData[]
  charts: ChartData[]
  /** 256 colours as hexadecimal text, by the name of the map. */
  colours: Record<string, string>
}
