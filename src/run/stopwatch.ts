/** Duration of a phase and processor time of all its threads. */
export interface PhaseTime {
  wallSeconds: number
  cpuSeconds: number
}

/** Time since the call before, or since the start. */
export function stopwatch(): () => PhaseTime {
  let wall = performance.now()
  let cpu = process.cpuUsage()
  return () => {
    const { user, system } = process.cpuUsage(cpu)
    const time = { wallSeconds: (performance.now() - wall) / 1000, cpuSeconds: (user + system) / 1e6 }
    wall = performance.now()
    cpu = process.cpuUsage()
    return time
  }
}

export function addTime(a: PhaseTime, b: PhaseTime): PhaseTime {
  return { wallSeconds: a.wallSeconds + b.wallSeconds, cpuSeconds: a.cpuSeconds + b.cpuSeconds }
}
