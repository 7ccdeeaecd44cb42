import { writeAtomic } from '../output/atomic.js'

/** The output folder cannot be used as asked; the message says why and what to do. Exit code 2. */
export class OutputError extends Error {
  override name = 'OutputError'
}

/** An OutputError for something the file system refused; other errors as they are. */
export function asOutputError(path: string, error: unknown): unknown {
  const { code } = error as NodeJS.ErrnoException
  if (typeof code !== 'string' || !Object.hasOwn(reasons, code)) return error
  return new OutputError(`cannot write ${path}: ${reasons[code]}`, { cause: error })
}

/** As `writeAtomic`. Throws OutputError. */
export async function writeOutput(path: string, data: string | Uint8Array): Promise<void> {
  try {
    await writeAtomic(path, data)
  } catch (error) {
    throw asOutputError(path, error)
  }
}

const reasons: Record<string, string> = {
  EACCES: 'permission denied',
  EPERM: 'permission denied',
  EROFS: 'the file system is read-only',
  EEXIST: 'a file of that name is in the way',
  ENOTDIR: 'a file is in the way of a folder',
  EISDIR: 'a folder is in the way',
  ENOENT: 'the folder cannot be made there',
  ENAMETOOLONG: 'the name is too long',
  ELOOP: 'too many symbolic links',
  ENOSPC: 'no space left on the disk',
  EDQUOT: 'the disk quota is used up',
  EFBIG: 'the file is too large for the file system',
  EMFILE: 'too many open files',
  EIO: 'the disk reports an error'
}
