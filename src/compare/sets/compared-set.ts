import type { Measured, Values } from '../goodness.js'
import type { MeasuredSpec, Scaling } from '../types.js'

/** How the model is moved on the sky: an offset of its centre (rad), and a turn about it (rad, from north towards east). */
export interface Placement {
  east: number
  north: number
  rotation: number
}

export const inPlace: Placement = { east: 0, north: 0, rotation: 0 }

/** Data with the model that they are compared with, both in cgs. */
export interface ComparedSet {
  spec: MeasuredSpec
  /** Values that are compared, one after another. */
  data: Measured
  /** Part of them that is independent: less than 1 where errors are correlated. */
  independent: number
  /** A step on the sky that changes the model visibly but little, rad. */
  step: number
  /** What can be fitted. */
  scalings: Scaling[]
  /** Values that are not compared, by the reason. */
  leftOut: Record<string, number>
  warnings: string[]
  /** cm; absent for data at many wavelengths. */
  wavelength?: number
  /** The model without a factor. */
  model: (placement: Placement) => Values
  shown: Shown
}

/** What is needed to show a data set: a table of rows, or a picture. */
export type Shown = ShownRows | ShownPicture

export interface ShownRows {
  kind: 'rows'
  /** Columns that say what the rows are, and the one that is the axis of the plot. */
  columns: { name: string; unit?: string; description: string; values: (number | string)[] }[]
  axis: { title: string; values: number[]; logarithmic: boolean }
  /** The unit of values in tables and plots. */
  unit: string
  quantity: string
  /** Turns values in cgs into that unit. */
  inUnit: (value: number, row: number) => number
  /** 1 sigma in that unit, from the value and its 1 sigma in cgs. */
  sigmaInUnit: (value: number, sigma: number, row: number) => number
  /** The model between the rows, times a factor, in that unit. */
  line?: (factor: number) => { x: number; y: number }[]
  /** What is plotted of complex values: the amplitude of real parts followed by as many imaginary ones. */
  complex?: true
}

export interface ShownPicture {
  kind: 'picture'
  /** Number of the pixel of each value. */
  pixels: Int32Array
  width: number
  height: number
  /** Offsets (rad) of each value from where the source is taken to be, without a fitted centre. */
  east: Float64Array
  north: Float64Array
  /** The pixel at an offset: x and y from 0. */
  place: (east: number, north: number) => [number, number]
  unit: string
  inUnit: (value: number) => number
  sigmaInUnit: (value: number, sigma: number) => number
  distance: number
}
