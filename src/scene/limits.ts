/** Most pixels along a side of an image. */
export const mostPixels = 16384

/** Most values (width x height x wavelengths) of one camera. */
export const mostCameraValues = 2.5e8

/** Largest scene file, largest table and largest field of densities, bytes. */
export const largestSceneFile = 1024 * 1024
export const largestDataFile = 64 * 1024 * 1024
export const largestFieldFile = 2 * 1024 * 1024 * 1024
