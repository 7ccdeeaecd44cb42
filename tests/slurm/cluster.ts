import { type ChildProcess, spawn, spawnSync } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import { chmodSync, closeSync, mkdirSync, mkdtempSync, openSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:net'
import { hostname, tmpdir, userInfo } from 'node:os'
import { join } from 'node:path'
import { setTimeout } from 'node:timers/promises'
import { outsideTool } from '../support/python.js'

/** Slurm as Debian has it. */
export const slurmTool = outsideTool('slurm-wlm munge', 'sbatch', ['--version'])

/** Daemons live in sbin. */
const searched = `${process.env.PATH}:/usr/sbin:/sbin`

export interface ClusterOptions {
  nodes?: number
  cpus?: number
  /** The greatest task id plus 1. */
  maxArraySize?: number
}

/**
 * A throw-away Slurm on loopback, in a folder of its own: no systemd, no cgroups, no database. Written after the manual pages
 * of slurm.conf(5), slurmd(8) and munged(8).
 */
export class Cluster {
  private readonly daemons = new Map<string, ChildProcess>()

  private constructor(
    private readonly folder: string,
    private readonly nodes: number
  ) {}

  /** What programs must have in their environment to talk to this cluster. */
  get env(): Record<string, string> {
    return { SLURM_CONF: join(this.folder, 'slurm.conf'), PATH: searched }
  }

  static async start({ nodes = 1, cpus = 4, maxArraySize = 1001 }: ClusterOptions = {}): Promise<Cluster> {
    // Sockets have short names: the folder must too.
    const folder = mkdtempSync(join(tmpdir(), 'slurm-'))
    chmodSync(folder, 0o755)
    const cluster = new Cluster(folder, nodes)
    for (const name of ['munge', 'ctld', 'log', ...range(nodes).map((n) => `spool/n${n}`)])
      mkdirSync(join(folder, name), { recursive: true, mode: 0o755 })
    writeFileSync(join(folder, 'munge/key'), randomBytes(1024), { mode: 0o600 })
    const ports = await freePorts(nodes + 1)
    writeFileSync(join(folder, 'slurm.conf'), configuration(folder, ports, cpus, maxArraySize))
    try {
      cluster.launch('munged')
      await until('munged answers', () => spawnSync('munge', ['-n', '-S', join(folder, 'munge/socket')]).status === 0)
      cluster.launch('slurmctld')
      for (const n of range(nodes)) cluster.launch(`n${n}`)
      await cluster.ready()
    } catch (error) {
      await cluster.stop()
      throw error
    }
    return cluster
  }

  /** Resolves when every node is idle. */
  async ready(): Promise<void> {
    await until('all nodes are idle', () => {
      const { stdout } = this.call('sinfo', '-h', '-N', '-o', '%T')
      return (
        stdout
          .trim()
          .split('\n')
          .filter((state) => state === 'idle').length === this.nodes
      )
    })
  }

  /** Runs one of Slurm's commands. */
  call(command: string, ...words: string[]): { stdout: string; status: number | null } {
    return spawnSync(command, words, { env: { ...process.env, ...this.env }, encoding: 'utf8', timeout: 20_000 })
  }

  /** Ends a daemon at once: munged, slurmctld, n1, n2, ... */
  async kill(name: string): Promise<void> {
    const daemon = this.daemons.get(name)!
    daemon.kill('SIGKILL')
    while (daemon.exitCode === null && daemon.signalCode === null) await setTimeout(20)
  }

  launch(name: string): void {
    const munge = ['munged', '-F', `--key-file=${this.folder}/munge/key`, `--socket=${this.folder}/munge/socket`]
    const command =
      name === 'munged'
        ? [...munge, ...['pid', 'seed', 'log'].map((file) => `--${file}-file=${this.folder}/munge/${file}`)]
        : name === 'slurmctld'
          ? ['slurmctld', '-D']
          : ['slurmd', '-D', '-N', name]
    const log = openSync(join(this.folder, 'log', `${name}.out`), 'a')
    const daemon = spawn(command[0], command.slice(1), {
      env: { ...withoutSlurm(process.env), ...this.env },
      stdio: ['ignore', log, log],
      detached: true
    })
    closeSync(log)
    daemon.on('error', () => {})
    this.daemons.set(name, daemon)
  }

  /** Ends all jobs and daemons, and removes the folder. */
  async stop(): Promise<void> {
    this.call('scancel', '-u', userInfo().username)
    await until('no job is left', () => this.call('squeue', '-h').stdout?.trim() === '', 10).catch(() => {})
    for (const daemon of [...this.daemons.values()].reverse()) {
      daemon.kill('SIGTERM')
      for (let i = 0; i < 250 && daemon.exitCode === null && daemon.signalCode === null; i++) await setTimeout(20)
      daemon.kill('SIGKILL')
    }
    // Tasks on a node whose daemon was killed, or that are stopped, outlive all this.
    for (const pid of processesWith(`SLURM_CONF=${this.env.SLURM_CONF}`)) process.kill(pid, 'SIGKILL')
    rmSync(this.folder, { recursive: true, force: true })
  }

  /** What the daemons have to say, for a failed test. */
  log(name: string): string {
    return readFileSync(join(this.folder, 'log', `${name}.log`), 'utf8')
      .split('\n')
      .slice(-20)
      .join('\n')
  }
}

/** Processes that have all these in their environment, such as `NAME=value`. */
export function processesWith(...words: string[]): number[] {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((pid) => {
      try {
        const environment = readFileSync(`/proc/${pid}/environ`, 'utf8').split('\0')
        return words.every((word) => environment.includes(word))
      } catch {
        return false // It has ended meanwhile, or is not ours.
      }
    })
    .map(Number)
}

function configuration(folder: string, [controller, ...ports]: number[], cpus: number, maxArraySize: number): string {
  const user = userInfo().username
  const host = hostname().split('.')[0]
  return `ClusterName=test
SlurmUser=${user}
SlurmdUser=${user}
SlurmctldHost=${host}(127.0.0.1)
SlurmctldPort=${controller}
CommunicationParameters=NoCtldInAddrAny,NoInAddrAny
AuthType=auth/munge
AuthInfo=socket=${folder}/munge/socket,cred_expire=5
CredType=cred/munge
StateSaveLocation=${folder}/ctld
SlurmdSpoolDir=${folder}/spool/%n
SlurmctldPidFile=${folder}/log/slurmctld.pid
SlurmdPidFile=${folder}/log/slurmd.%n.pid
SlurmctldLogFile=${folder}/log/slurmctld.log
SlurmdLogFile=${folder}/log/slurmd.%n.log
MailProg=/bin/true
ProctrackType=proctrack/linuxproc
TaskPlugin=task/none
JobAcctGatherType=jobacct_gather/none
MpiDefault=none
AccountingStorageType=accounting_storage/none
SelectType=select/cons_tres
SelectTypeParameters=CR_CPU
SlurmdParameters=config_overrides
SchedulerType=sched/backfill
SchedulerParameters=batch_sched_delay=0,sched_interval=1,bf_interval=2
MaxArraySize=${maxArraySize}
MinJobAge=300
JobRequeue=1
ReturnToService=2
SlurmdTimeout=10
KillWait=2
${ports.map((port, i) => `NodeName=n${i + 1} NodeHostname=${host} NodeAddr=127.0.0.1 Port=${port} CPUs=${cpus} RealMemory=4000 State=UNKNOWN`).join('\n')}
PartitionName=test Nodes=ALL Default=YES DefaultTime=60 MaxTime=INFINITE State=UP
`
}

function range(count: number): number[] {
  return Array.from({ length: count }, (_, i) => i + 1)
}

function withoutSlurm(env: NodeJS.ProcessEnv): NodeJS.ProcessEnv {
  return Object.fromEntries(Object.entries(env).filter(([name]) => !/^(SLURM|SBATCH|SQUEUE|SCANCEL|SINFO)_/.test(name)))
}

async function freePorts(count: number): Promise<number[]> {
  const servers = await Promise.all(
    range(count).map(
      () =>
        new Promise<ReturnType<typeof createServer>>((resolve) => {
          const server = createServer().listen(0, '127.0.0.1', () => resolve(server))
        })
    )
  )
  const ports = servers.map((server) => (server.address() as { port: number }).port)
  await Promise.all(servers.map((server) => new Promise((resolve) => server.close(resolve))))
  return ports
}

async function until(what: string, holds: () => boolean, seconds = 60): Promise<void> {
  for (const start = Date.now(); !holds(); await setTimeout(200))
    if (Date.now() - start > 1000 * seconds) throw new Error(`not so after ${seconds} s: ${what}`)
}
