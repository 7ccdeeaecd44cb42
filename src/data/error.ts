/** A data file cannot be used; the message says which file and why. Exit code 2. */
export class DataError extends Error {
  override name = 'DataError'

  constructor(
    readonly file: string,
    /** What is wrong, without the name of the file. */
    readonly reason: string
  ) {
    super(`${file}: ${reason}`)
  }
}
