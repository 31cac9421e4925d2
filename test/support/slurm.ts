import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { createServer } from 'node:net';
import { hostname, tmpdir } from 'node:os';
import { join } from 'node:path';

/** What a Slurm of our own takes. Debian: slurmctld, slurmd, slurm-client, munge. */
const PROGRAMS = ['slurmctld', 'slurmd', 'sbatch', 'munged'];

/** Programs that are not here, of those that a cluster takes; and root, who alone may run one. */
export function missingForSlurm(): string[] {
  const missing = PROGRAMS.filter((name) => spawnSync('sh', ['-c', `command -v ${name}`]).status !== 0);
  return process.getuid?.() === 0 ? missing : [...missing, 'root'];
}

/** A Slurm of three nodes on this machine, of our own: it touches no other. */
export interface Cluster {
  /** What programs need to talk to it. */
  readonly env: NodeJS.ProcessEnv;
  /** Runs one of its commands and returns what it printed. */
  readonly run: (command: string, ...args: string[]) => string;
  /** Whether a task that exits with 75 goes back into the queue of itself. */
  readonly setRequeueExit: (on: boolean) => Promise<void>;
  /** Ends a node and all that runs on it as a power cut would; the number of processes that it was. */
  readonly cutPower: (node: string) => number;
  /** Puts a node back into service. */
  readonly restore: (node: string) => Promise<void>;
  readonly stop: () => Promise<void>;
}

export const NODES = ['n1', 'n2', 'n3'] as const;

export async function startCluster(): Promise<Cluster> {
  const folder = mkdtempSync(join(tmpdir(), 'loopswell-slurm-'));
  const conf = join(folder, 'slurm.conf');
  const ports = await freePorts(1 + NODES.length);
  const env: NodeJS.ProcessEnv = { ...process.env, SLURM_CONF: conf };
  const daemons = new Map<string, ChildProcess>();
  const munge = startMunge();
  for (const path of ['state', 'log']) mkdirSync(join(folder, path));
  writeFileSync(join(folder, 'cgroup.conf'), 'CgroupPlugin=autodetect\n');
  writeFileSync(conf, confText(folder, ports, false));

  const run = (command: string, ...args: string[]): string => {
    const { status, stdout, stderr, error } = spawnSync(command, args, { encoding: 'utf8', env });
    if (error !== undefined) throw error;
    if (status !== 0) throw new Error(`${command} ${args.join(' ')} ended with ${status}: ${stderr}`);
    return stdout.trim();
  };
  const start = (name: string, command: string, args: readonly string[]): void => {
    daemons.set(name, spawn(command, ['-D', '-f', conf, ...args], { env, stdio: 'ignore' }));
  };
  const startNode = (node: string): void => start(node, 'slurmd', ['-N', node]);
  const idleNodes = (): number =>
    run('sinfo', '--noheader', '--Node', '--partition=farm', '--format=%T')
      .split('\n')
      .filter((state) => state === 'idle').length;

  start('slurmctld', 'slurmctld', ['-i']);
  for (const node of NODES) startNode(node);
  await eventually('three idle nodes', () => idleNodes() === NODES.length);

  return {
    env,
    run,
    async setRequeueExit(on) {
      writeFileSync(conf, confText(folder, ports, on));
      run('scontrol', 'reconfigure');
      await eventually(
        'the setting',
        () => run('scontrol', 'show', 'config').includes('RequeueExit             = 75') === on,
      );
    },
    cutPower(node) {
      const pids = processesOf(readFileSync(join(folder, `${node}.pid`), 'utf8').trim(), folder, node);
      for (const pid of pids) process.kill(pid, 'SIGKILL');
      run('scontrol', 'update', `nodename=${node}`, 'state=down', 'reason=power');
      return pids.length;
    },
    async restore(node) {
      startNode(node);
      await eventually('the node', () => {
        run('scontrol', 'update', `nodename=${node}`, 'state=resume');
        return run('sinfo', '--noheader', `--nodes=${node}`, '--partition=farm', '--format=%T') === 'idle';
      });
    },
    async stop() {
      spawnSync('scancel', ['--user=root'], { env });
      await eventually('an empty queue', () => run('squeue', '--noheader') === '', 20).catch(() => {});
      for (const daemon of [...daemons.values(), ...munge]) daemon.kill('SIGTERM');
      await eventually('the daemons to end', () =>
        [...daemons.values(), ...munge].every(
          ({ exitCode, signalCode }) => exitCode !== null || signalCode !== null,
        ),
      );
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

/** Waits until a condition holds. */
export async function eventually(what: string, condition: () => boolean, seconds = 120): Promise<void> {
  const deadline = performance.now() + 1000 * seconds;
  for (;;) {
    try {
      if (condition()) return;
    } catch (error) {
      // A daemon that is still starting answers nothing.
      if (performance.now() > deadline) throw error;
    }
    if (performance.now() > deadline) throw new Error(`Waited ${seconds} s for ${what} in vain.`);
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

/** The daemon that vouches for users; one that runs already will do. */
function startMunge(): ChildProcess[] {
  if (spawnSync('munge', ['-n']).status === 0) return [];
  mkdirSync('/run/munge', { recursive: true });
  spawnSync('chown', ['munge:munge', '/run/munge']);
  chmodSync('/run/munge', 0o755);
  if (!existsSync('/etc/munge/munge.key')) spawnSync('mungekey', ['--create']);
  spawnSync('chown', ['munge:munge', '/etc/munge/munge.key']);
  const user = ['--reuid=munge', '--regid=munge', '--clear-groups'];
  return [spawn('setpriv', [...user, 'munged', '--foreground'], { stdio: 'ignore' })];
}

/** A node's daemon, its steps (which leave it) and everything they run: known by the node's name in their environment. */
function processesOf(daemon: string, folder: string, node: string): number[] {
  const pids = readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .map(Number);
  const own = pids.filter((pid) => {
    const environment = environmentOf(pid);
    return environment.includes(`SLURMD_NODENAME=${node}\0`) && environment.includes(folder);
  });
  const steps = pids.filter((pid) => commandOf(pid).startsWith('slurmstepd') && parentsOf(own).has(pid));
  return [...new Set([Number(daemon), ...steps, ...own])];
}

/** The processes that started some processes. */
function parentsOf(pids: readonly number[]): Set<number> {
  return new Set(pids.map((pid) => Number(/^PPid:\s*(\d+)$/m.exec(procText(pid, 'status'))?.[1])));
}

function commandOf(pid: number): string {
  return procText(pid, 'cmdline');
}

function environmentOf(pid: number): string {
  return procText(pid, 'environ');
}

/** A text about a process; empty where it has ended meanwhile. */
function procText(pid: number, name: string): string {
  try {
    return readFileSync(`/proc/${pid}/${name}`, 'utf8');
  } catch {
    return '';
  }
}

async function freePorts(count: number): Promise<number[]> {
  const servers = Array.from({ length: count }, () => createServer());
  const ports = await Promise.all(
    servers.map(
      (server) =>
        new Promise<number>((resolve) => {
          server.listen(0, '127.0.0.1', () => resolve((server.address() as { port: number }).port));
        }),
    ),
  );
  await Promise.all(servers.map((server) => new Promise((resolve) => server.close(resolve))));
  return ports;
}

/** Slurm on one machine, as root, without systemd or cgroups. Two partitions: the upper takes nodes from the lower. */
function confText(folder: string, [controller, ...nodes]: readonly number[], requeueExit: boolean): string {
  const host = hostname().split('.')[0];
  return `ClusterName=loopswell
SlurmctldHost=${host}(127.0.0.1)
SlurmUser=root
SlurmdUser=root
SlurmctldPort=${controller}
AuthType=auth/munge
AuthInfo=cred_expire=5
StateSaveLocation=${folder}/state
SlurmdSpoolDir=${folder}/%n
SlurmctldPidFile=${folder}/slurmctld.pid
SlurmdPidFile=${folder}/%n.pid
SlurmctldLogFile=${folder}/log/slurmctld.log
SlurmdLogFile=${folder}/log/%n.log
ProctrackType=proctrack/linuxproc
TaskPlugin=task/none
SchedulerType=sched/backfill
SelectType=select/cons_tres
SelectTypeParameters=CR_Core_Memory
ReturnToService=2
MpiDefault=none
SwitchType=switch/none
JobAcctGatherType=jobacct_gather/none
AccountingStorageType=accounting_storage/none
InactiveLimit=0
KillWait=10
MinJobAge=300
SchedulerParameters=bf_interval=1,sched_interval=1,batch_sched_delay=1,requeue_delay=1
JobRequeue=1
${requeueExit ? 'RequeueExit=75\n' : ''}PreemptType=preempt/partition_prio
PreemptMode=REQUEUE
${nodes.map((port, i) => `NodeName=${NODES[i]} NodeHostname=${host} NodeAddr=127.0.0.1 Port=${port} CPUs=1 RealMemory=2000 State=UNKNOWN`).join('\n')}
PartitionName=farm Nodes=n[1-3] Default=YES MaxTime=INFINITE State=UP PriorityTier=1 PreemptMode=REQUEUE
PartitionName=urgent Nodes=n[1-3] MaxTime=INFINITE State=UP PriorityTier=10 PreemptMode=OFF
`;
}
