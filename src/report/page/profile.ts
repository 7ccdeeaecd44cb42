/** The pixels along a line, each once, with the distance of their middles from the first, arcsec. */
function pixelsAlong({ pixel }: PictureData, [from, to]: [Pixel, Pixel]): (Pixel & { distance: number })[] {
  const count = Math.max(Math.abs(to.x - from.x), Math.abs(to.y - from.y), 1)
  return Array.from({ length: count + 1 }, (_, i) => {
    const x = Math.round(from.x + ((to.x - from.x) * i) / count)
    const y = Math.round(from.y + ((to.y - from.y) * i) / count)
    return { x, y, distance: Math.hypot((x - from.x) * pixel[0], (y - from.y) * pixel[1]) }
  })
}

/** The chart of a profile along a line: values of pixels with their 1 sigma, in the unit shown. */
function profileChart(
  data: PictureData,
  line: [Pixel, Pixel],
  measured: (index: number) => { value: number; sigma: number },
  unit: string,
  logarithmic: boolean
): ChartData {
  const along = pixelsAlong(data, line).filter(({ distance }, i, all) => i === 0 || distance > all[i - 1].distance)
  const points = along.map(({ x, y }) => measured(y * data.width + x))
  const known = (value: number) => (Number.isFinite(value) ? value : null)
  return {
    title: 'Profile along the line',
    file: data.file,
    x: { label: 'distance along the line', unit: 'arcsec', values: along.map(({ distance }) => distance) },
    y: { label: 'value', units: [{ name: unit, kind: unit.startsWith('mag') ? 'magnitude' : 'linear', cgs: [] }] },
    series: [
      {
        name: 'value',
        values: points.map(({ value }) => known(value)),
        sigma: points.map(({ sigma }) => known(sigma)),
        look: 'line'
      }
    ],
    log: { x: false, y: logarithmic }
  }
}
