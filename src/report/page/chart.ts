/** A drawn chart that can be drawn anew. */
interface Chart {
  draw(): void
}

const CHART_HEIGHT = 340

/** Pixels from mark to mark of the axes. */
const ACROSS = 80
const UP = 40

/** Curves with scales, units and zoom to choose, and the values at the cursor. */
function makeChart(host: HTMLElement, data: ChartData): Chart {
  const own = data.y.units[0]
  const state = { unit: own, logX: data.log.x, logY: data.log.y, at: 0 }
  const plot = element('div', { class: 'chart', tabindex: '0', role: 'application' })
  plot.setAttribute('aria-label', `${data.title}: arrow keys move the cursor, plus and minus zoom, 0 shows all`)
  const legend = element('ul', { class: 'legend', 'aria-live': 'polite' })
  let drawn: import('uplot') | undefined
  const values = () =>
    data.series.map((series) =>
      series.values.map((value, i) =>
        value === null
          ? { value: Number.NaN, sigma: Number.NaN }
          : converted(value, series.sigma?.[i] ?? Number.NaN, own, state.unit, i)
      )
    )
  let shown = values()
  const magnitudes = () => state.unit.kind === 'magnitude'

  const showValues = () => {
    const { x } = data
    const entries = data.series.map(({ name }, s) => {
      const swatch = element('i')
      swatch.style.borderTopColor = pageColour(`s${s % 6}`)
      const { value, sigma } = shown[s][state.at]
      return element('li', {}, swatch, `${name} ${measuredText(value, sigma, state.unit.name)}`)
    })
    legend.replaceChildren(element('li', {}, `${x.label} ${numberText(x.values[state.at])} ${x.unit}`), ...entries)
  }
  const zoom = (factor: number) => {
    const { x } = data
    const [low, high] = [drawn!.scales.x.min ?? x.values[0], drawn!.scales.x.max ?? x.values[0]]
    const middle = x.values[state.at]
    const towards = (end: number) => (state.logX ? middle * (end / middle) ** factor : middle + (end - middle) * factor)
    const [least, most] = [Math.min(...x.values), Math.max(...x.values)]
    drawn!.setScale('x', { min: Math.max(least, towards(low)), max: Math.min(most, towards(high)) })
  }
  const all = () => drawn!.setScale('x', { min: Math.min(...data.x.values), max: Math.max(...data.x.values) })

  const draw = () => {
    shown = values()
    drawn?.destroy()
    const logY = state.logY && !magnitudes()
    const table = shown.map((series) =>
      series.map(({ value }) => (Number.isFinite(value) && (!logY || value > 0) ? value : null))
    )
    const ink = pageColour('quiet')
    const axis = (label: string, logarithmic: boolean, spacing: number): import('uplot').Axis => ({
      label,
      // The marks of uPlot never end where numbers are below 1e-16.
      splits: (chart, _, low, high) => {
        const count = Math.max(2, (spacing === ACROSS ? chart.bbox.width : chart.bbox.height) / devicePixelRatio / spacing)
        return logarithmic ? decadeTicks(low, high, count) : roundTicks(low, high, count)
      },
      filter: (_, splits) => splits,
      stroke: ink,
      labelSize: 22,
      font: '12px system-ui, sans-serif',
      labelFont: '13px system-ui, sans-serif',
      grid: { stroke: pageColour('line'), width: 1 },
      ticks: { stroke: pageColour('line'), width: 1 },
      values: (_, ticks) => ticks.map((tick) => (tick === null ? '' : numberText(tick, 4)))
    })
    drawn = new uPlot(
      {
        width: plot.clientWidth,
        height: CHART_HEIGHT,
        legend: { show: false },
        cursor: { drag: { x: true, y: false }, points: { size: 7 } },
        scales: {
          x: {
            time: false,
            distr: state.logX ? 3 : 1,
            range: rangeAcross(data)
          },
          y: { distr: logY ? 3 : 1, dir: magnitudes() ? -1 : 1, range: rangeOfCurves(logY) }
        },
        axes: [
          axis(`${data.x.label} (${data.x.unit})`, state.logX, ACROSS),
          { ...axis(`${data.y.label} (${unitWords(state.unit.name)})`, logY, UP), size: 66 }
        ],
        series: [
          {},
          ...data.series.map(({ name, look }, s) => ({
            label: name,
            stroke: pageColour(`s${s % 6}`),
            width: s === 0 ? 2 : 1.5,
            ...(look === 'points' && { paths: () => null, points: { show: true, size: 8 } })
          }))
        ],
        hooks: {
          draw: [(chart) => paintErrors(chart, data, shown)],
          setCursor: [
            ({ cursor }) => {
              if (cursor.idx === null || cursor.idx === undefined) return
              state.at = cursor.idx
              showValues()
            }
          ]
        }
      },
      [data.x.values, ...table],
      plot
    )
    drawn.root.querySelector('canvas')?.setAttribute('aria-hidden', 'true')
    showValues()
  }

  const tick = (text: string, on: boolean, set: (value: boolean) => void) => {
    const input = element('input', { type: 'checkbox' })
    input.checked = on
    input.addEventListener('change', () => {
      set(input.checked)
      draw()
    })
    return element('label', { class: 'tick' }, input, text)
  }
  const units = choice(
    'unit',
    data.y.units.map(({ name }) => unitWords(name)),
    (i) => {
      state.unit = data.y.units[i]
      draw()
    }
  )
  const controls = element('div', { class: 'controls' })
  if (data.y.units.length > 1) controls.append(units.box)
  controls.append(
    tick('logarithmic across', state.logX, (on) => {
      state.logX = on
    }),
    tick('logarithmic up', state.logY, (on) => {
      state.logY = on
    }),
    button('+', () => zoom(0.6), 'zoom in'),
    button('−', () => zoom(1 / 0.6), 'zoom out'),
    button('all', all, 'show all')
  )
  const step = (by: number) => {
    state.at = Math.min(data.x.values.length - 1, Math.max(0, state.at + by))
    const left = drawn!.valToPos(data.x.values[state.at], 'x')
    const top = drawn!.over.clientHeight / 2
    drawn!.setCursor({ left, top })
    showValues()
  }
  const keys: Record<string, () => void> = {
    ArrowLeft: () => step(-1),
    ArrowRight: () => step(1),
    Home: () => step(-data.x.values.length),
    End: () => step(data.x.values.length),
    '+': () => zoom(0.6),
    '-': () => zoom(1 / 0.6),
    '0': all
  }
  plot.addEventListener('keydown', (event) => {
    const act = keys[event.key]
    if (!act || event.ctrlKey || event.metaKey || event.altKey) return
    event.preventDefault()
    act()
  })
  host.replaceChildren(
    controls,
    plot,
    legend,
    element('p', { class: 'quiet' }, `Drag across to zoom, double click for all. Numbers: ${data.file}`)
  )
  draw()
  return { draw }
}

/** The whole of the axis, or what is zoomed to; with room for points at the ends. */
function rangeAcross({ x, series }: ChartData): import('uplot').Scale.Range {
  const room = series.some(({ look }) => look === 'points') || x.values.length === 1 ? 1.08 : 1
  return (_, low, high) => [low / room, high * room || 1]
}

/** Margins about the curves; of a logarithmic scale at most eight decades are shown. */
function rangeOfCurves(logarithmic: boolean): import('uplot').Scale.Range {
  return (_, low, high) => {
    if (low === null || high === null || !Number.isFinite(low) || !Number.isFinite(high)) return [logarithmic ? 1 : 0, 10]
    if (logarithmic) return [Math.max(low / 1.4, high * 1e-8), high * 1.4]
    const margin = 0.05 * (high - low || Math.abs(high) || 1)
    return [low - margin, high + margin]
  }
}

/** Bars of 1 sigma where they can be seen. */
function paintErrors(chart: import('uplot'), data: ChartData, shown: { value: number; sigma: number }[][]): void {
  const { ctx, bbox } = chart
  ctx.save()
  ctx.beginPath()
  ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height)
  ctx.clip()
  shown.forEach((series, s) => {
    if (!data.series[s].sigma) return
    ctx.strokeStyle = pageColour(`s${s % 6}`)
    ctx.lineWidth = window.devicePixelRatio || 1
    ctx.beginPath()
    series.forEach(({ value, sigma }, i) => {
      if (!(Number.isFinite(value) && sigma > 0)) return
      const x = chart.valToPos(data.x.values[i], 'x', true)
      const ends = [value - sigma, value + sigma].map((end) => chart.valToPos(end, 'y', true))
      const [from, to] = ends.map((end) => (Number.isFinite(end) ? end : bbox.top + bbox.height))
      ctx.moveTo(x, from)
      ctx.lineTo(x, to)
    })
    ctx.stroke()
  })
  ctx.restore()
}
