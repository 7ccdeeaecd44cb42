import { parse, stringify } from 'yaml'

/** Uniform random numbers of a case. */
export type Uniform = () => number

type Container = Record<string, unknown> | unknown[]
type Place = { holder: Container; key: string }

const pick = <Item>(items: readonly Item[], uniform: Uniform): Item => items[Math.floor(items.length * uniform())]
const whole = (most: number, uniform: Uniform) => Math.floor(most * uniform())

const UNITS = [
  'K',
  'au',
  'pc',
  'cm',
  'um',
  'Hz',
  'Msun',
  'Lsun',
  'erg/s',
  'g/cm3',
  'cm2/g',
  'Jy',
  'MJy/sr',
  'deg',
  'arcsec',
  '%',
  'x',
  ''
]
const SCALARS = [
  0,
  -1,
  1,
  1e-300,
  1e300,
  1e-30,
  1e30,
  -1e300,
  5e-324,
  2 ** 53,
  Number.NaN,
  Number.POSITIVE_INFINITY,
  0.1,
  true,
  null,
  '',
  'solve',
  'none',
  'all',
  '~'
]
const KEYS = [
  'name',
  'kind',
  'shape',
  '__proto__',
  'constructor',
  'toString',
  'length',
  'temperature',
  'wavelengths',
  '',
  'é',
  '0',
  'at',
  '<<'
]

/** All places of a tree, containers too. */
function placesOf(value: unknown, found: Place[] = []): Place[] {
  if (typeof value !== 'object' || value === null) return found
  for (const key of Object.keys(value)) {
    found.push({ holder: value as Container, key })
    placesOf((value as Record<string, unknown>)[key], found)
  }
  return found
}

const get = ({ holder, key }: Place) => (holder as Record<string, unknown>)[key]
const set = ({ holder, key }: Place, value: unknown) =>
  Object.defineProperty(holder, key, { value, enumerable: true, configurable: true, writable: true })

function remove({ holder, key }: Place): void {
  if (Array.isArray(holder)) holder.splice(Number(key), 1)
  else delete holder[key]
}

/** A number of any size, with its unit left, changed or taken away. */
function rescaled(value: unknown, uniform: Uniform): unknown {
  const [, number, unit] = /^(-?[\d.e+-]+)(?: (.*))?$/.exec(String(value)) ?? []
  if (number === undefined) return value
  const size = pick([0, -1, 1e-300, 1e300, 1e-12, 1e12, 1e-3, 1e3, 0.5, 2, 1.1, 0.9, 3, 10, 1e5], uniform)
  const scaled = uniform() < 0.8 ? Number(number) * size : size
  if (unit === undefined) return uniform() < 0.9 ? scaled : `${scaled} ${pick(UNITS, uniform)}`
  return uniform() < 0.9 ? `${scaled} ${unit}` : `${number} ${pick(UNITS, uniform)}`
}

/** Factors that a scene may well survive. */
const MILD = [0.3, 0.5, 0.9, 1.1, 2, 3, 10, 1e-3, 1e3]

function mildly(value: unknown, uniform: Uniform): unknown {
  const [, number, rest = ''] = /^(-?[\d.e+-]+)( .*)?$/.exec(String(value)) ?? []
  if (number === undefined) return value
  const scaled = Number((Number(number) * pick(MILD, uniform)).toPrecision(6))
  return rest === '' && typeof value === 'number' ? (Number.isInteger(value) ? Math.round(scaled) : scaled) : `${scaled}${rest}`
}

function strange(uniform: Uniform): unknown {
  switch (whole(9, uniform)) {
    case 0:
      return pick(SCALARS, uniform)
    case 1:
      return `${pick(SCALARS, uniform)} ${pick(UNITS, uniform)}`
    case 2:
      return 'a'.repeat(10 ** whole(6, uniform))
    case 3:
      return Array.from({ length: 10 ** whole(5, uniform) }, () => pick(SCALARS, uniform))
    case 4:
      return Array.from({ length: 10 ** whole(4, uniform) }, (_, i) => `${i + 1} um`)
    case 5:
      return { [pick(KEYS, uniform)]: pick(SCALARS, uniform) }
    case 6:
      return []
    case 7:
      return {}
    default: {
      let nest: unknown = 'deep'
      for (let depth = 3 ** whole(5, uniform); depth > 0; depth--) nest = depth % 2 ? [nest] : { a: nest }
      return nest
    }
  }
}

/** Changes the size of some number. */
function rescale(places: Place[], change: (value: unknown, uniform: Uniform) => unknown, uniform: Uniform): void {
  const leaves = places.filter((place) => ['string', 'number'].includes(typeof get(place)) && /^-?[\d.]/.test(String(get(place))))
  if (leaves.length === 0) return
  const place = pick(leaves, uniform)
  set(place, change(get(place), uniform))
}

const TREE = {
  drop: (places: Place[], uniform: Uniform) => remove(pick(places, uniform)),
  rename: (places: Place[], uniform: Uniform) => {
    const place = pick(places, uniform)
    if (Array.isArray(place.holder)) return
    const value = get(place)
    const key = uniform() < 0.5 ? pick(KEYS, uniform) : `${place.key.slice(0, -1)}${pick(['x', '', 's'], uniform)}`
    remove(place)
    set({ holder: place.holder, key }, value)
  },
  replace: (places: Place[], uniform: Uniform) => set(pick(places, uniform), strange(uniform)),
  rescale: (places: Place[], uniform: Uniform) => rescale(places, rescaled, uniform),
  swap: (places: Place[], uniform: Uniform) => {
    const [a, b] = [pick(places, uniform), pick(places, uniform)]
    const [x, y] = [structuredClone(get(a)), structuredClone(get(b))]
    set(a, y)
    set(b, x)
  },
  repeat: (places: Place[], uniform: Uniform) => {
    const lists = places.filter((place) => Array.isArray(get(place)))
    if (lists.length === 0) return
    const list = get(pick(lists, uniform)) as unknown[]
    const count = 10 ** whole(4, uniform)
    for (let i = 0; i < count && list.length > 0; i++) {
      const copy = structuredClone(list[0])
      if (typeof copy === 'object' && copy !== null && 'name' in copy && uniform() < 0.9) copy.name = `copy${i}`
      list.push(copy)
    }
  }
}

/** Rescaling keeps scenes sound more often than anything else, and so gets furthest. */
const MOVES = [
  TREE.drop,
  TREE.rename,
  TREE.replace,
  TREE.swap,
  TREE.repeat,
  TREE.rescale,
  TREE.rescale,
  TREE.rescale,
  TREE.rescale
]

const TEXT: ((text: string, uniform: Uniform) => string)[] = [
  (text, uniform) => text.slice(0, whole(text.length, uniform)),
  (text, uniform) => splice(text, uniform, String.fromCharCode(whole(0x250, uniform))),
  (text, uniform) =>
    splice(
      text,
      uniform,
      pick(
        [
          '\0',
          '\t',
          '\n',
          ': ',
          '- ',
          '{',
          '}',
          '[',
          ']',
          '"',
          '&a ',
          '*a',
          '!!binary ',
          '<<: *a',
          '|',
          '---\n',
          '\ufeff',
          '\u2028'
        ],
        uniform
      )
    ),
  (text, uniform) =>
    splice(text, uniform, Array.from({ length: 200 }, () => String.fromCharCode(whole(0xffff, uniform))).join('')),
  (text) =>
    `a: &a [x, x, x, x, x, x, x, x, x]\n${'bcdefghij'.replace(/./g, (key) => `${key}: &${key} [${Array(9).fill(`*${String.fromCharCode(key.charCodeAt(0) - 1)}`)}]\n`)}${text}`,
  (text) => text.replace(/^(\s*)-/m, '$1- &loop\n$1  self: *loop\n$1 '),
  (text) => text.replaceAll('\n', '\r\n'),
  (text, uniform) => `${text}deep: ${pick(['[', '{a: ', '- '], uniform).repeat(10 ** whole(6, uniform))}`,
  (text, uniform) => text.repeat(1 + whole(3, uniform))
]

function splice(text: string, uniform: Uniform, piece: string): string {
  const at = whole(text.length, uniform)
  return text.slice(0, at) + piece + text.slice(at + (uniform() < 0.5 ? 0 : 1))
}

/** Share of the scenes of which only numbers are changed, and those so that most stay sound. */
const MILDLY = 0.35

/** A scene with one to three things changed in its tree, or now and then in its text. */
export function mutatedScene(text: string, uniform: Uniform): string {
  const tree = parse(text)
  const count = 1 + whole(3, uniform)
  const mild = uniform() < MILDLY
  for (let i = 0; i < count; i++) {
    const places = placesOf(tree)
    if (mild) rescale(places, mildly, uniform)
    else if (places.length > 0) pick(MOVES, uniform)(places, uniform)
  }
  const written = uniform() < 0.1 ? text : stringify(tree, { aliasDuplicateObjects: false })
  return uniform() < 0.1 || written === text ? pick(TEXT, uniform)(written, uniform) : written
}

/** A table of numbers with some things changed in it. */
export function mutatedTable(text: string, uniform: Uniform): string {
  let changed = text
  const count = 1 + whole(4, uniform)
  for (let i = 0; i < count; i++) {
    const cells = changed.split(/([,\n])/)
    const at = 2 * whole(Math.ceil(cells.length / 2), uniform)
    const moves = [
      () => (cells[at] = String(rescaled(cells[at], uniform))),
      () => (cells[at] = String(pick(SCALARS, uniform))),
      () => (cells[at] = 'a'.repeat(10 ** whole(6, uniform))),
      () => cells.splice(at, 2),
      () =>
        (cells[at] = Array(10 ** whole(5, uniform))
          .fill(cells[at])
          .join(pick(['\n', ','], uniform))),
      () => (cells[0] = pick(['wavelength', 'wavelength [um]', 'absorption [cm2/g]', 'flux-nu [Jy]', '', '"', 'x [y]'], uniform))
    ]
    pick(moves, uniform)()
    changed = cells.join('')
  }
  return uniform() < 0.3 ? pick(TEXT, uniform)(changed, uniform) : changed
}
