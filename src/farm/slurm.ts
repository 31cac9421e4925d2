import { VERSION } from '../version.ts';
import { type FarmFile, type FarmJob, gatherCommand, shardCommand } from './farm-job.ts';
import { commandText } from './shell.ts';

/** The scripts that bake a job on Slurm: one to be run, which submits the two others. */
export function slurmScripts(job: FarmJob): readonly FarmFile[] {
  return [
    { path: 'submit.sh', text: submitScript(job), executable: true },
    { path: 'frames.sh', text: framesScript(job), executable: true },
    { path: 'gather.sh', text: gatherScript(job), executable: true },
  ];
}

function submitScript({ title, tasks, maxRunning }: FarmJob): string {
  const array = maxRunning === null ? `1-${tasks}` : `1-${tasks}%${maxRunning}`;
  return `#!/bin/bash
# Submits the bake of "${title}" to Slurm: ${count(tasks, 'task')} of frames.sh, then gather.sh once all are done.
# Run it again after a failure: what is finished is not made again.
# Written by loopswell ${VERSION}; edit it as your farm needs. The numbers of both jobs go to stdout.
set -euo pipefail
cd "$(dirname "$(readlink -f "$0")")"
mkdir -p logs
frames=$(sbatch --parsable --array=${array} frames.sh)
frames=\${frames%%;*} # a cluster's name may follow the number
gather=$(sbatch --parsable --dependency="afterok:$frames" --kill-on-invalid-dep=yes gather.sh)
echo "frames $frames"
echo "gather \${gather%%;*}"
`;
}

function framesScript(job: FarmJob): string {
  const shard = `"$SLURM_ARRAY_TASK_ID/${job.tasks}"`;
  const command = commandText(shardCommand(job, '@')).replace(/@$/, shard);
  return `${header(job, `${job.name}-frames`, 'logs/frames-%A_%a.log', job.taskMinutes)}
# Shard $SLURM_ARRAY_TASK_ID of ${job.tasks}. It needs nothing from the others, which may run before, after or at once.
${keptRunning(`${command} ${threads(job)}`, '"$SLURM_ARRAY_JOB_ID"_"$SLURM_ARRAY_TASK_ID"', job.maxRequeues)}`;
}

function gatherScript(job: FarmJob): string {
  return `${header(job, `${job.name}-gather`, 'logs/gather-%j.log', job.gatherMinutes)}
# Checks that every frame is there, makes foam, and writes the manifest.
${keptRunning(`${commandText(gatherCommand(job))} ${threads(job)}`, '"$SLURM_JOB_ID"', job.maxRequeues)}`;
}

function header(job: FarmJob, name: string, log: string, minutes: number): string {
  const partition = job.partition === null ? '' : `\n#SBATCH --partition=${job.partition}`;
  return `#!/bin/bash
# ${job.title}. Written by loopswell ${VERSION}; edit it as your farm needs.
#SBATCH --job-name=${name}
#SBATCH --output=${log}
#SBATCH --open-mode=append
#SBATCH --nodes=1
#SBATCH --ntasks=1
#SBATCH --cpus-per-task=${job.cpus}
#SBATCH --mem=${job.memoryMiB}M
#SBATCH --time=${minutes}
#SBATCH --requeue
#SBATCH --signal=B:TERM@60${partition}`;
}

function threads({ cpus }: FarmJob): string {
  return `--threads "\${SLURM_CPUS_PER_TASK:-${cpus}}"`;
}

/**
 * The shell stays, because whether Slurm puts a task that exits with 75 back into the queue is a setting of the site
 * (RequeueExit). It hears the signal, passes it on, and asks for the requeue itself.
 */
function keptRunning(command: string, task: string, maxRequeues: number): string {
  return `
# Slurm signals a task that is pre-empted or at its time limit. The program then finishes the frames it is on, within
# 5 s, and exits with 75: run again, it makes only what is missing.
told=0
stop() {
  told=1
  kill -TERM "$program" 2>/dev/null
}
trap stop TERM
${command} &
program=$!
[ "$told" = 0 ] || stop # told before there was a program to tell
status=0
wait "$program" || status=$?
# The signal ends the wait, not the program.
while kill -0 "$program" 2>/dev/null; do
  status=0
  wait "$program" || status=$?
done
if [ "$told" = 1 ] && [ "$status" -ge 128 ]; then status=75; fi

# Put back into the queue by ourselves, unless Slurm has already decided what becomes of this task.
if [ "$status" = 75 ] && [ "\${SLURM_RESTART_COUNT:-0}" -lt ${maxRequeues} ]; then
  task=${task}
  if [ "$(squeue --noheader --jobs="$task" --format=%T)" = RUNNING ]; then
    echo "Stopped early; back into the queue (\${SLURM_RESTART_COUNT:-0} times before)."
    scontrol requeue "$task"
    # The requeue ends this script.
    sleep 60
  fi
fi
exit "$status"
`;
}

function count(n: number, what: string): string {
  return `${n} ${what}${n === 1 ? '' : 's'}`;
}
