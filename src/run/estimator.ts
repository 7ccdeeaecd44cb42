/** How scattered light is estimated. */
export type Estimator = 'emissivity' | 'peel' | 'exit'
