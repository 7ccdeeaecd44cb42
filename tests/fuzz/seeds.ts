/** Sound scenes that the fuzz starts from; together they use every section and kind that there is. */
export const seeds = [
  `title: Small wind
distance: 300 pc
sky: {ra: 84.21 deg, dec: -31.7 deg}
seed: first
sources:
  - name: giant
    temperature: 3000 K
    luminosity: 5000 Lsun
    at: [0 au, 0 au, 0 au]
opacities:
  soot:
    law: power
    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}
    slope: 1
    scattering: {albedo: 0.5, asymmetry: 0.3}
dust:
  - name: wind
    opacity: soot
    shape: {kind: shell, inner: 10 au, outer: 1000 au, slope: -2}
    amount: {optical-depth: 1.5, at: 0.55 um}
grid: {kind: spherical, radial: 12}
effort: {precision: none, equilibrium: 1000, cameras: 300}
cameras:
  - name: face
    view: {inclination: 35 deg, azimuth: 0 deg, roll: 0 deg}
    field: 2000 au
    pixels: 4
    wavelengths: [2.2 um, 60 um]
    unit: MJy/sr
spectra:
  - name: sed
    aperture: 6 arcsec
    wavelengths: {from: 1 um, to: 100 um, count: 3}
    unit: Jy
`,
  `distance: 140 pc
sources:
  - {name: star, kind: star, temperature: 4000 K, radius: 2 Rsun, extent: sphere, limb-darkening: 0.6}
opacities:
  mixed: {law: table, file: mixed.csv, phase: isotropic}
  grey: {law: power, reference: {wavelength: 1 um, absorption: 100 cm2/g}, slope: 0, scattering: {albedo: 0.9, asymmetry: -0.2, slope: 4}, phase: {two-term: {first: 0.8, second: -0.3, share: 80 %}}}
dust:
  - name: disk
    opacity: mixed
    shape: {kind: disk, inner: 0.5 au, outer: 80 au, surface-slope: -1, scale-height: {value: 10 au, at: 100 au, flaring: 1.25}, taper: {at: 50 au}}
    amount: {mass: 1e-10 Msun}
  - name: halo
    opacity: grey
    shape: {kind: ball, radius: 90 au}
    amount: {density: 1e-22 g/cm3, at: 10 au}
    temperature: 30 K
grid: {kind: spherical, radial: 12, polar: 8}
effort: {precision: 20 %, equilibrium: 1000, cameras: 300}
cameras:
  - {name: side, view: {inclination: 80 deg}, field: [1 arcsec, 0.5 arcsec], pixels: [4, 2], wavelengths: [1.65 um], unit: mJy/arcsec2}
spectra:
  - {name: all, view: {inclination: 80 deg}, wavelengths: [10 um, 1.3 mm], unit: W/m2/um}
`,
  `distance: 1 kpc
sources:
  - {name: lamp, luminosity: 10 Lsun, spectrum: {table: lamp.csv}}
opacities:
  dark: {law: power, reference: {wavelength: 1 um, absorption: 100 cm2/g}, slope: 1.5, scattering: {albedo: 0.2}, phase: rayleigh}
dust:
  - {name: cloud, opacity: dark, shape: {kind: shell, inner: 1 pc, outer: {times-inner: 10}}, amount: {optical-depth: 0.1, at: 1 um}, temperature: none}
effort: {equilibrium: 1000, cameras: 300, precision: none}
spectra:
  - {name: sed, aperture: all, wavelengths: [1 um, 3 um], unit: Jy}
`,
  `distance: 100 pc
sources:
  - {name: star, temperature: 6000 K, luminosity: 3 Lsun}
opacities:
  grey: {law: power, reference: {wavelength: 1 um, absorption: 100 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.2}, phase: {table: law.csv}}
dust:
  - name: ring
    opacity: grey
    shape: {kind: ring, radius: 90 au, width: 20 au, scale-height: 20 au, eccentricity: 0.2, periapsis: 30 deg, tilt: {angle: 20 deg, toward: 40 deg}}
    amount: {optical-depth: 0.3, at: 1 um}
  - name: envelope
    opacity: grey
    shape: {kind: infall, inner: 10 au, outer: 200 au, centrifugal-radius: 50 au}
    amount: {mass: 1e-9 Msun}
    carve: [{gap: {from: 20 au, to: 30 au, remaining: 0.1}}, {cavity: {half-angle: 25 deg, remaining: 0}}]
  - name: slab
    opacity: grey
    shape: {kind: slab, thickness: 30 au, width: 90 au, at: [0 au, 20 au, 80 au]}
    amount: {density: 1e-22 g/cm3, at: 1 au}
    clumps: {count: 5, radius: 12 au, contrast: 10, seed: a}
    temperature: none
  - name: cloud
    opacity: grey
    shape: {kind: field, file: points.csv, width: 150 au}
    amount: {mass: 1e-10 Msun}
grid: {kind: spherical, radial: 8, polar: 6, azimuthal: 5}
effort: {equilibrium: 500, cameras: 200, precision: none}
cameras:
  - {name: oblique, view: {inclination: 60 deg, azimuth: 20 deg}, field: 500 au, pixels: 3, wavelengths: [1 um, 100 um]}
`,
  `distance: 200 pc
sources:
  - {name: star, temperature: 6000 K, luminosity: 3 Lsun}
opacities:
  several:
    law: grains
    populations:
      - mass-fraction: 0.6
        constants: {bruggeman: [{constants: {n: 2, k: 1}, volume-fraction: 0.7}, {constants: {n: 1.5}, volume-fraction: 0.3}]}
        sizes: {smallest: 80 nm, largest: 160 nm, median: 100 nm, width: 0.3}
        grain-density: 3 g/cm3
        porosity: 0.2
      - mass-fraction: 0.4
        constants: {oscillators: {infinity: 2.6, terms: [{at: 10 um, strength: 0.8, damping: 0.2}, {at: 520 cm-1, strength: 1.6, damping: 180 cm-1}]}}
        sizes: {file: radii.csv}
        grain-density: 2 g/cm3
        coat: {constants: {maxwell-garnett: {matrix: {n: 1.3, k: 0.1}, inclusions: [{constants: nk.csv, volume-fraction: 0.1}]}}, volume-fraction: 0.2, density: 1 g/cm3}
    phase: isotropic
  galactic: {law: extinction-curve, curve: pei-1992, galaxy: milky-way, reference: {wavelength: 0.55 um, extinction: 2e4 cm2/g}, scattering: {albedo: 0.6, asymmetry: 0.5}}
dust:
  - {name: a, opacity: galactic, shape: {kind: shell, inner: 10 au, outer: 200 au}, amount: {optical-depth: 0.3, at: 1 um}}
  - {name: b, opacity: several, shape: {kind: ball, radius: 90 au}, amount: {mass: 1e-10 Msun}, temperature: 30 K}
  - {name: c, opacity: galactic, shape: {kind: ball, radius: 50 au}, amount: {mass: 1e-10 Msun}, temperature: none}
grid: {kind: spherical, radial: 8}
effort: {equilibrium: 500, cameras: 200, precision: none}
spectra:
  - {name: sed, wavelengths: [1 um, 10 um], unit: Jy}
`
]

/** Tables that the scenes name. */
export const tables = {
  'mixed.csv': `# a table
wavelength [um],absorption [cm2/g],scattering [cm2/g],asymmetry
0.1,9000,4000,0.6
1,900,800,0.4
10,500,3,0.1
1000,0.5,0,0
`,
  'nk.csv': 'wavelength [um],n,k\n0.1,1.6,0.5\n1,1.7,0.03\n10,1.5,0.8\n1000,3,0.1\n',
  'radii.csv': 'radius [nm],number\n100,5\n200,1\n',
  'points.csv': 'x [au],y [au],z [au],smoothing-length [au],mass\n10,20,30,20,1\n-50,0,0,30,2\n0,-60,10,30,2\n',
  'law.csv': 'angle [deg],s11,s12,s33,s34\n0,2,0,2,0\n90,1,-0.9,0.1,0.2\n180,2,0,-2,0\n',
  'lamp.csv': 'wavelength [um],flux-nu [Jy]\n0.3,1\n1,30\n3,20\n30,0.2\n'
}
