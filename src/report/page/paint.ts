/** Where the image lies in its canvas, CSS pixels. */
interface Frame {
  left: number
  top: number
  width: number
  height: number
  /** Height of the whole canvas. */
  total: number
}

/** What a picture shows. */
interface Shown {
  data: PictureData
  values: Float64Array
  unit: string
  range: Limits
  stretch: StretchName
  colours: Uint32Array
  cursor: Pixel
  line?: [Pixel, Pixel]
}

interface Pixel {
  x: number
  y: number
}

function frameOf({ width, height, pixel }: PictureData, canvasWidth: number): Frame {
  const left = 58
  const frame = canvasWidth - left - 14
  const tall = (frame * height * pixel[1]) / (width * pixel[0])
  return { left, top: 8, width: frame, height: tall, total: tall + 112 }
}

/** The pixel under a place of the canvas; undefined beside the image. */
function pixelAt({ width, height }: PictureData, frame: Frame, left: number, top: number): Pixel | undefined {
  const x = Math.floor(((left - frame.left) / frame.width) * width)
  const y = height - 1 - Math.floor(((top - frame.top) / frame.height) * height)
  return x >= 0 && y >= 0 && x < width && y < height ? { x, y } : undefined
}

/** Offset of the middle of a pixel from the centre of the picture, arcsec, east and north. */
function offsetOf({ width, height, pixel }: PictureData, { x, y }: Pixel): { east: number; north: number } {
  return { east: (width / 2 - x - 0.5) * pixel[0], north: (y + 0.5 - height / 2) * pixel[1] }
}

/** Draws image, axes, colour bar, beam, cursor and line; one pixel of the data is one of the image, magnified without smoothing. */
function paint(canvas: HTMLCanvasElement, shown: Shown): Frame {
  const { data } = shown
  const width = canvas.clientWidth
  const frame = frameOf(data, width)
  const density = window.devicePixelRatio || 1
  canvas.width = Math.round(width * density)
  canvas.height = Math.round(frame.total * density)
  const pen = canvas.getContext('2d')!
  pen.scale(density, density)
  pen.font = '12px system-ui, "Segoe UI", Roboto, "DejaVu Sans", sans-serif'
  pen.imageSmoothingEnabled = false
  pen.drawImage(imageOf(shown), frame.left, frame.top, frame.width, frame.height)
  pen.fillStyle = pen.strokeStyle = pageColour('ink')
  pen.strokeRect(frame.left - 0.5, frame.top - 0.5, frame.width + 1, frame.height + 1)
  paintAxes(pen, data, frame)
  paintBar(pen, shown, frame)
  pen.save()
  pen.beginPath()
  pen.rect(frame.left, frame.top, frame.width, frame.height)
  pen.clip()
  if (data.beam) paintBeam(pen, data, frame, data.beam)
  paintMarks(pen, shown, frame)
  pen.restore()
  return frame
}

/** The image alone, a pixel each; what has no value is grey. */
function imageOf({ data: { width, height }, values, range, stretch, colours }: Shown): HTMLCanvasElement {
  const canvas = document.createElement('canvas')
  canvas.width = width
  canvas.height = height
  const pen = canvas.getContext('2d')!
  const image = pen.createImageData(width, height)
  const words = new Uint32Array(image.data.buffer)
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const t = placeOf(values[(height - 1 - y) * width + x], range, stretch)
      words[y * width + x] = Number.isNaN(t) ? 0xff888888 : colours[t > 0 ? Math.min(255, Math.floor(t * 256)) : 0]
    }
  }
  pen.putImageData(image, 0, 0)
  return canvas
}

function paintAxes(pen: CanvasRenderingContext2D, data: PictureData, frame: Frame): void {
  const [wide, tall] = [data.width * data.pixel[0], data.height * data.pixel[1]]
  const bottom = frame.top + frame.height
  pen.textAlign = 'center'
  pen.textBaseline = 'top'
  for (const east of roundTicks(-wide / 2, wide / 2, frame.width / 75)) {
    const x = frame.left + (0.5 - east / wide) * frame.width
    pen.fillRect(x - 0.5, bottom + 1, 1, 5)
    pen.fillText(numberText(east), Math.min(x, frame.left + frame.width - 8), bottom + 8)
  }
  pen.fillText('offset to the east (arcsec)', frame.left + frame.width / 2, bottom + 24)
  pen.textAlign = 'right'
  pen.textBaseline = 'middle'
  for (const north of roundTicks(-tall / 2, tall / 2, frame.height / 60)) {
    const y = frame.top + (0.5 - north / tall) * frame.height
    pen.fillRect(frame.left - 6, y - 0.5, 5, 1)
    pen.fillText(numberText(north), frame.left - 9, Math.max(y, frame.top + 4))
  }
  pen.save()
  pen.translate(9, frame.top + frame.height / 2)
  pen.rotate(-Math.PI / 2)
  pen.textAlign = 'center'
  pen.fillText('to the north (arcsec)', 0, 0)
  pen.restore()
}

function paintBar(
  pen: CanvasRenderingContext2D,
  { range, stretch, colours, unit }: Shown,
  { left, top, width, height }: Frame
): void {
  const bar = top + height + 50
  for (let x = 0; x < width; x++) {
    const word = colours[Math.min(255, Math.floor((x / width) * 256))]
    pen.fillStyle = `rgb(${word & 255} ${(word >> 8) & 255} ${(word >> 16) & 255})`
    pen.fillRect(left + x, bar, Math.min(1.5, width - x), 12)
  }
  pen.fillStyle = pageColour('ink')
  pen.strokeRect(left - 0.5, bar - 0.5, width + 1, 13)
  pen.textBaseline = 'top'
  const count = Math.max(2, Math.floor(width / 110))
  for (let i = 0; i <= count; i++) {
    pen.textAlign = i === 0 ? 'left' : i === count ? 'right' : 'center'
    pen.fillRect(left + (i / count) * width - 0.5, bar + 13, 1, 4)
    pen.fillText(numberText(valueAtPlace(i / count, range, stretch), 3), left + (i / count) * width, bar + 19)
  }
  pen.textAlign = 'center'
  pen.fillText(unitWords(unit), left + width / 2, bar + 36)
}

function paintBeam(pen: CanvasRenderingContext2D, data: PictureData, frame: Frame, beam: NonNullable<PictureData['beam']>): void {
  const scale = frame.width / (data.width * data.pixel[0])
  const [major, minor] = [(beam.major * scale) / 2, (beam.minor * scale) / 2]
  const turn = ((90 + beam.positionAngle) * Math.PI) / 180
  pen.beginPath()
  // East is to the left: a position angle from north through east turns against the clock.
  pen.ellipse(frame.left + major + 8, frame.top + frame.height - major - 8, major, minor, -turn, 0, 2 * Math.PI)
  twoTone(pen)
}

function paintMarks(pen: CanvasRenderingContext2D, { data, cursor, line }: Shown, frame: Frame): void {
  const place = ({ x, y }: Pixel): [number, number] => [
    frame.left + ((x + 0.5) / data.width) * frame.width,
    frame.top + ((data.height - y - 0.5) / data.height) * frame.height
  ]
  if (line) {
    pen.beginPath()
    pen.moveTo(...place(line[0]))
    pen.lineTo(...place(line[1]))
    twoTone(pen)
  }
  const [x, y] = place(cursor)
  pen.beginPath()
  for (const [dx, dy] of [
    [1, 0],
    [-1, 0],
    [0, 1],
    [0, -1]
  ]) {
    pen.moveTo(x + 5 * dx, y + 5 * dy)
    pen.lineTo(x + 14 * dx, y + 14 * dy)
  }
  twoTone(pen)
}

/** Strokes what stands out of bright and dark ground alike. */
function twoTone(pen: CanvasRenderingContext2D): void {
  pen.strokeStyle = '#000'
  pen.lineWidth = 3.5
  pen.stroke()
  pen.strokeStyle = '#fff'
  pen.lineWidth = 1.5
  pen.stroke()
  pen.lineWidth = 1
}
