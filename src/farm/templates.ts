import { VERSION } from '../version.ts';
import { type FarmFile, type FarmJob, gatherCommand, shardCommand } from './farm-job.ts';
import { commandText, quoted } from './shell.ts';

/** Open formats of other schedulers in which the same work can be had. */
export const FARM_TEMPLATES = ['openjd', 'kubernetes', 'parallel'] as const;
export type FarmTemplate = (typeof FARM_TEMPLATES)[number];

/** A template as the file it is written to. */
export function farmTemplate(name: FarmTemplate, job: FarmJob): FarmFile {
  switch (name) {
    case 'openjd':
      return { path: 'openjd.yaml', text: openJobTemplate(job), executable: false };
    case 'kubernetes':
      return { path: 'kubernetes.yaml', text: kubernetesJobs(job), executable: false };
    case 'parallel':
      return { path: 'parallel.sh', text: parallelScript(job), executable: true };
  }
}

/** Text as a YAML scalar that is a string whatever is in it: JSON's strings are YAML's. */
const text = (value: string): string => JSON.stringify(value);
const list = (values: readonly string[]): string => `[${values.map(text).join(', ')}]`;

/**
 * A job template of Open Job Description: a step of shards, then one that gathers.
 * Source: Open Job Description, Template Schemas 2023-09 (from memory).
 */
function openJobTemplate(job: FarmJob): string {
  // Braces would be read as the name of a parameter.
  const words = (command: readonly string[]): readonly string[] =>
    command.map((word) => word.replaceAll('{{', '{ {'));
  const [program, ...shard] = words(
    shardCommand({ ...job, planPath: '@plan', bakeFolder: '@bake' }, '@shard'),
  );
  const [, ...gather] = words(gatherCommand({ ...job, bakeFolder: '@bake' }));
  const filled = (word: string): string =>
    ({ '@plan': '{{Param.Plan}}', '@bake': '{{Param.Bake}}', '@shard': `{{Task.Param.Shard}}/${job.tasks}` })[
      word
    ] ?? word;
  const action = (args: readonly string[], minutes: number): string => `
        command: ${text(program)}
        args: ${list([...args.map(filled), '--threads', `${job.cpus}`])}
        timeout: ${60 * minutes}
        cancelation:
          mode: NOTIFY_THEN_TERMINATE
          notifyPeriodInSeconds: 15`;
  const host = `
    hostRequirements:
      amounts:
        - { name: amount.worker.vcpu, min: ${job.cpus} }
        - { name: amount.worker.memory, min: ${job.memoryMiB} }`;
  return `# ${job.title}. Written by loopswell ${VERSION}; edit it as your farm needs.
# A task that is stopped exits with 75 and makes only what is missing when it is run again.
specificationVersion: jobtemplate-2023-09
name: ${text(job.name)}
parameterDefinitions:
  - name: Plan
    type: PATH
    objectType: FILE
    dataFlow: IN
    default: ${text(job.planPath)}
  - name: Bake
    type: PATH
    objectType: DIRECTORY
    dataFlow: INOUT
    default: ${text(job.bakeFolder)}
steps:
  - name: Frames
    parameterSpace:
      taskParameterDefinitions:
        - { name: Shard, type: INT, range: "1-${job.tasks}" }${host}
    script:
      actions:
        onRun:${indented(action(shard, job.taskMinutes))}
  - name: Gather
    dependencies:
      - dependsOn: Frames${host}
    script:
      actions:
        onRun:${indented(action(gather, job.gatherMinutes))}
`;
}

function indented(block: string): string {
  return block.replaceAll('\n', '\n  ');
}

function parentFolder(path: string): string {
  return path.slice(0, Math.max(1, path.lastIndexOf('/')));
}

/** An Indexed Job for the shards and a suspended Job that gathers. Source: Kubernetes batch/v1 (from memory). */
function kubernetesJobs(job: FarmJob): string {
  const container = (command: readonly string[]): string => `
          image: loopswell # an image of yours with Node and this program
          command: ${list([...command, '--threads', `${job.cpus}`])}
          resources:
            requests: { cpu: "${job.cpus}", memory: ${job.memoryMiB}Mi }
            limits: { memory: ${job.memoryMiB}Mi }
          volumeMounts:
            - { name: shared, mountPath: ${text(parentFolder(job.bakeFolder))} }`;
  const pod = (name: string, command: readonly string[]): string => `
  template:
    spec:
      restartPolicy: Never
      terminationGracePeriodSeconds: 30
      containers:
        - name: ${name}${container(command)}
      volumes:
        - name: shared
          persistentVolumeClaim: { claimName: shared } # holds the plan and the bake, for all pods`;
  // Stopped early (75) is no failure; a wrong command, plan or folder is one for good.
  const policy = `
  podFailurePolicy:
    rules:
      - action: Ignore
        onPodConditions: [{ type: DisruptionTarget }]
      - action: Ignore
        onExitCodes: { operator: In, values: [75] }
      - action: FailJob
        onExitCodes: { operator: In, values: [64, 65, 69, 73] }`;
  return `# ${job.title}. Written by loopswell ${VERSION}; edit it as your farm needs.
# kubectl apply -f this file, then let the second job run once the first is complete:
#   kubectl wait --for=condition=complete --timeout=-1s job/${job.name}-frames
#   kubectl patch job/${job.name}-gather -p '{"spec":{"suspend":false}}'
apiVersion: batch/v1
kind: Job
metadata: { name: ${text(`${job.name}-frames`)} }
spec:
  completionMode: Indexed
  completions: ${job.tasks}
  parallelism: ${job.maxRunning ?? job.tasks}
  backoffLimit: ${job.maxRequeues}${policy}${pod('frames', shardCommand(job, `auto/${job.tasks}`))}
---
apiVersion: batch/v1
kind: Job
metadata: { name: ${text(`${job.name}-gather`)} }
spec:
  suspend: true
  backoffLimit: ${job.maxRequeues}${policy}${pod('gather', gatherCommand(job))}
`;
}

/** A script for GNU parallel, on this machine or on those of a login file. */
function parallelScript(job: FarmJob): string {
  const shard = commandText(shardCommand(job, '@')).replace(/@$/, `{}/${job.tasks}`);
  return `#!/bin/bash
# ${job.title}. Written by loopswell ${VERSION}; edit it as you need.
# ${job.maxRunning ?? 1} at once on this machine; for others add --sshloginfile FILE. Run it again after a failure: shards.log tells parallel
# which shards are done, and the bake folder tells the program which frames are. Remove shards.log to begin anew.
set -euo pipefail
cd "$(dirname "$(readlink -f "$0")")"
seq 1 ${job.tasks} | parallel --jobs ${job.maxRunning ?? 1} --joblog shards.log --resume-failed --halt soon,fail=1 --termseq TERM,10000,KILL \\
  ${quoted(`${shard} --threads ${job.cpus}`)}
${commandText(gatherCommand(job))} --threads ${job.cpus}
`;
}
