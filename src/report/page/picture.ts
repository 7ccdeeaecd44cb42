/** Pixels that an arrow key goes with the shift key. */
const LONG_STEP = 10

/** A picture with all that can be chosen, the value at its cursor, and the profile along a line. */
function makePicture(host: HTMLElement, data: PictureData, maps: PageData['colours']): Chart {
  const own = data.units[0]
  const names = Object.keys(maps)
  const state = {
    k: 0,
    plane: data.planes[0],
    unit: own,
    stretch: 'linear' as StretchName,
    map: names[0],
    cursor: { x: Math.floor(data.width / 2), y: Math.floor(data.height / 2) } as Pixel,
    line: undefined as [Pixel, Pixel] | undefined,
    drawing: false
  }
  let reach = { low: 0, high: 1, even: true }
  let range: Limits = { low: 0, high: 1 }
  let raw: Float32Array
  let sigmas: Float32Array | undefined
  let values: Float64Array
  let frame: Frame
  let profile: Chart | undefined
  let waiting = 0

  const canvas = element('canvas', { class: 'sky', tabindex: '0', role: 'application' })
  canvas.setAttribute(
    'aria-label',
    `${data.heading}: arrow keys move the cursor, with shift ten pixels; space begins and ends a line, escape removes it`
  )
  const readout = element('output', { class: 'readout', 'aria-live': 'polite' })
  const below = element('div')
  const isSigma = () => /^(SIGMA|NOISE|MODELSIG)/.test(state.plane.name)
  /** About 0, with colours to match. */
  const isSigned = () => /^([QUV]|RESIDUAL)$/.test(state.plane.name)
  const isStokes = () => /^(SIGMA_)?[QUV]$/.test(state.plane.name)
  const measured = (index: number) => {
    const sigma = sigmas ? sigmas[index] : Number.NaN
    if (state.unit === own || isStokes()) return { value: raw[index], sigma }
    // An error is converted with the value that it belongs to.
    if (isSigma()) {
      const of = data.planes.find((plane) => plane.sigma === state.plane.name) ?? data.planes[0]
      const whole = planeOf(of.name)
      return { value: converted(whole[index], raw[index], own, state.unit, state.k).sigma, sigma: Number.NaN }
    }
    return converted(raw[index], sigma, own, state.unit, state.k)
  }
  const decoded = new Map<string, Float32Array>()
  const planeOf = (name: string): Float32Array => {
    const key = `${name} ${state.k}`
    const there = decoded.get(key) ?? realsOf(data.values[name][state.k])
    decoded.set(key, there)
    return there
  }
  const unitName = () => (isStokes() && own.kind === 'magnitude' ? 'MJy/sr' : isStokes() ? own.name : state.unit.name)
  const isMagnitude = () => state.unit.kind === 'magnitude' && !isSigma() && !isStokes()

  const show = () => {
    const map = colourWords(maps[state.map])
    // Magnitudes count downwards: the brightest has the highest colour.
    const colours = isMagnitude() ? map.slice().reverse() : map
    frame = paint(canvas, {
      data,
      values,
      unit: unitName(),
      range,
      stretch: state.stretch,
      colours,
      cursor: state.cursor,
      line: state.line
    })
    canvas.style.height = `${frame.total}px`
    const { east, north } = offsetOf(data, state.cursor)
    const { value, sigma } = measured(state.cursor.y * data.width + state.cursor.x)
    const au = (angle: number) => numberText(angle * data.auPerArcsec, 4)
    readout.textContent = `${measuredText(value, sigma, unitName())}${errorNote(sigma)}\n${numberText(east, 4)} arcsec east, ${numberText(north, 4)} arcsec north (${au(east)}, ${au(north)} au), pixel ${state.cursor.x + 1}, ${state.cursor.y + 1}`
    low.show(stepOfValue(range.low, reach), numberText(range.low, 3))
    high.show(stepOfValue(range.high, reach), numberText(range.high, 3))
  }
  const errorNote = (sigma: number) => {
    const meaning = data.planes.find(({ name }) => name === state.plane.sigma)?.meaning
    return Number.isFinite(sigma) && meaning ? ` (${meaning})` : ''
  }
  const soon = () => {
    cancelAnimationFrame(waiting)
    waiting = requestAnimationFrame(show)
  }
  const showProfile = () => {
    if (!state.line) {
      profile = undefined
      below.replaceChildren()
      return
    }
    const box = element('div')
    below.replaceChildren(element('h3', {}, 'Profile along the line'), box)
    profile = makeChart(box, profileChart(data, state.line, measured, unitName(), state.stretch === 'logarithmic'))
  }
  /** Reads values anew; the range starts afresh. */
  const load = () => {
    raw = planeOf(state.plane.name)
    sigmas = state.plane.sigma ? planeOf(state.plane.sigma) : undefined
    values = Float64Array.from(raw, (_, i) => measured(i).value)
    reach = reachOf(values, isMagnitude())
    if (reach.even && state.stretch === 'logarithmic') {
      state.stretch = 'linear'
      stretch.select.selectedIndex = 0
    }
    range = usualRange(values, reach)
    if (isSigned()) {
      const most = Math.max(-reach.low, reach.high)
      reach = { low: -most, high: most, even: true }
      range = { low: -most, high: most }
    } else if (state.stretch !== 'logarithmic' && !reach.even) range = { low: 0, high: range.high }
    show()
    if (state.line) showProfile()
  }

  const wavelength = slider('wavelength', data.wavelengths.length - 1, (k) => {
    state.k = k
    wavelength.show(k, data.wavelengths[k])
    load()
  })
  const plane = choice(
    'light',
    data.planes.map(({ meaning }) => meaning),
    (i) => {
      state.plane = data.planes[i]
      useSignedColours()
      load()
    }
  )
  const unit = choice(
    'unit',
    data.units.map(({ name }) => unitWords(name)),
    (i) => {
      state.unit = data.units[i]
      load()
    }
  )
  const stretch = choice('stretch', stretches, (i) => {
    state.stretch = stretches[i]
    load()
  })
  const map = choice('colours', names, (i) => {
    state.map = names[i]
    show()
  })
  const useSignedColours = () => {
    if (!isSigned()) return
    state.map = names.at(-1)!
    map.select.selectedIndex = names.length - 1
  }
  const low = slider('from', RANGE_STEPS, (step) => {
    range.low =
      step === 0 && !reach.even && state.stretch !== 'logarithmic'
        ? 0
        : valueAtStep(Math.min(step, stepOfValue(range.high, reach) - 1), reach)
    show()
  })
  const high = slider('to', RANGE_STEPS, (step) => {
    range.high = valueAtStep(Math.max(step, stepOfValue(range.low, reach) + 1), reach)
    show()
  })

  const moveTo = (pixel: Pixel) => {
    state.cursor = pixel
    if (state.drawing && state.line) state.line = [state.line[0], pixel]
    soon()
  }
  const pixelOf = (event: PointerEvent) => pixelAt(data, frame, event.offsetX, event.offsetY)
  canvas.addEventListener('pointerdown', (event) => {
    const pixel = pixelOf(event)
    if (!pixel || event.button !== 0) return
    canvas.setPointerCapture(event.pointerId)
    state.line = [pixel, pixel]
    state.drawing = true
    moveTo(pixel)
  })
  canvas.addEventListener('pointermove', (event) => {
    const pixel = pixelOf(event)
    if (pixel) moveTo(pixel)
  })
  const endLine = () => {
    if (!state.drawing || !state.line) return
    state.drawing = false
    const [from, to] = state.line
    if (from.x === to.x && from.y === to.y) state.line = undefined
    show()
    showProfile()
  }
  canvas.addEventListener('pointerup', endLine)
  canvas.addEventListener('pointercancel', endLine)
  const arrows: Record<string, [number, number]> = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, 1], ArrowDown: [0, -1] }
  canvas.addEventListener('keydown', (event) => {
    const arrow = arrows[event.key]
    if (event.ctrlKey || event.metaKey || event.altKey || !(arrow || event.key === ' ' || event.key === 'Escape')) return
    event.preventDefault()
    if (arrow) {
      const step = event.shiftKey ? LONG_STEP : 1
      const within = (value: number, count: number) => Math.min(count - 1, Math.max(0, value))
      moveTo({
        x: within(state.cursor.x + step * arrow[0], data.width),
        y: within(state.cursor.y + step * arrow[1], data.height)
      })
    } else if (event.key === 'Escape') {
      state.line = undefined
      state.drawing = false
      show()
      showProfile()
    } else if (state.drawing) endLine()
    else {
      state.line = [state.cursor, state.cursor]
      state.drawing = true
      show()
    }
  })

  const controls = element('div', { class: 'controls' })
  if (data.wavelengths.length > 1) controls.append(wavelength.box)
  controls.append(plane.box)
  if (data.units.length > 1) controls.append(unit.box)
  controls.append(stretch.box, map.box, low.box, high.box)
  const hint = element(
    'p',
    { class: 'quiet' },
    `Point at a pixel for its value; drag a line for a profile. All digits: ${data.file}`
  )
  host.replaceChildren(controls, element('figure', { class: 'sky' }, canvas), readout, hint, below)
  wavelength.show(0, data.wavelengths[0])
  useSignedColours()
  // Most pictures span many decades.
  raw = planeOf(state.plane.name)
  const first = reachOf(Float64Array.from(raw), own.kind === 'magnitude')
  const usual = usualRange(Float64Array.from(raw), first)
  if (!first.even && usual.high > 30 * usual.low) {
    state.stretch = 'logarithmic'
    stretch.select.selectedIndex = 2
  }
  load()
  return {
    draw: () => {
      show()
      profile?.draw()
    }
  }
}
