/** Processor time counts neither waiting nor other programs on a busy machine. */
export interface Times {
  wallSeconds: number
  cpuSeconds: number
}
