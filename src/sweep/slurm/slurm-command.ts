import { execFile } from 'node:child_process'

/** Slurm is not there, does not answer, or refuses; the message says which. Exit code 2. */
export class SlurmError extends Error {
  override name = 'SlurmError'
  constructor(
    message: string,
    /** Whether the machine has Slurm at all. */
    readonly present = true
  ) {
    super(message)
  }
}

/** `sbatch` itself gives up after 9 s without its controller, after 49 s without its authentication. */
const PATIENCE = 90

type Program = 'sbatch' | 'squeue' | 'scancel' | 'scontrol'

/** Output of one of Slurm's commands. Throws SlurmError. */
export function slurm(program: Program, words: string[]): Promise<string> {
  return new Promise((resolve, reject) => {
    execFile(program, words, { timeout: 1000 * PATIENCE, maxBuffer: 1 << 28 }, (error, stdout, stderr) => {
      if (!error) return resolve(stdout)
      if (error.code === 'ENOENT') return reject(new SlurmError(`this machine has no Slurm: there is no \`${program}\``, false))
      const said = stderr.trim().split('\n').slice(-3).join('; ')
      reject(new SlurmError(`${program}: ${error.killed ? `no answer within ${PATIENCE} s` : said || error.message}`))
    })
  })
}
