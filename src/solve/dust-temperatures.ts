import type { Model } from '../model/model.js'

/** Temperatures of all dust; component c, cell i at c * cells + i. */
export interface DustTemperatures {
  /** K; 0 where a component has no dust or does not emit. */
  temperature: Float64Array
  /** 1 sigma, K; 0 where the temperature is given, NaN where no packet came and none of its surroundings tells it. */
  sigma: Float64Array
  /** x GROUPS: relative deviation of each group's absorbed energy from the mean of all; empty when none is solved. */
  deviation: Float32Array
  /** d ln(cooling) / d ln(T): how steeply the emission rises with temperature; 0 where the temperature is given. */
  slope: Float64Array
}

/** Temperatures of a model in which none has to be solved. */
export function givenTemperatures(model: Model): DustTemperatures {
  const { components, cells } = model
  const temperature = new Float64Array(components.length * cells)
  components.forEach(({ spec, density }, c) => {
    if (typeof spec.temperature !== 'number') return
    for (let i = 0; i < cells; i++) if (density[i] > 0) temperature[c * cells + i] = spec.temperature
  })
  const zeros = () => new Float64Array(temperature.length)
  return { temperature, sigma: zeros(), deviation: new Float32Array(0), slope: zeros() }
}
