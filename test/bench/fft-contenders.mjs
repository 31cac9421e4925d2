// Two-dimensional inverse transforms against each other, alternating in one run:
//
//     npm run build && node test/bench/fft-contenders.mjs [ROUNDS] [SIZE ...]
//
// FFTW (needs gcc and libfftw3-dev; left out where they are missing), the float32 kernel for any spectrum and for one
// within half the Nyquist index, and the float64 engine. Medians of CPU time, which other programs disturb less than
// wall time. The kernel leaves its result in strips, as its maps read it; FFTW leaves rows.
import { execFileSync, spawnSync } from 'node:child_process';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { float64Engine } from '../../dist/field/float64-engine.js';
import { stripsBytes } from '../../dist/kernel/wave/layout.js';
import { transformPlanBytes, writeTransformPlan } from '../../dist/kernel/wave/transform-plan.js';
import { waveKernel } from '../../dist/kernel/wave/wave-kernel.js';

const [rounds = 7, ...asked] = process.argv.slice(2).map(Number);
const sizes = asked.length > 0 ? asked : [256, 512, 1024, 2048];
const fftw = compiledFftw();

for (const N of sizes) {
  const contenders = { ...kernelContenders(N), 'float64 (fft.js)': float64Contender(N) };
  if (fftw !== null) {
    contenders['FFTW f32 MEASURE'] = () =>
      Number(execFileSync(fftw, [String(N), '0.3'], { encoding: 'utf8' }));
  }
  const times = new Map(Object.keys(contenders).map((name) => [name, []]));
  for (let round = 0; round < rounds; round++) {
    for (const [name, run] of Object.entries(contenders)) times.get(name).push(run());
  }
  const medians = new Map([...times].map(([name, list]) => [name, median(list)]));
  const reference = medians.get('FFTW f32 MEASURE') ?? medians.get('kernel');
  for (const [name, time] of medians) {
    const rate = (5 * N * N * Math.log2(N * N)) / time / 1000;
    console.log(
      `${String(N).padStart(5)}  ${name.padEnd(18)} ${time.toFixed(0).padStart(9)} us  ${rate.toFixed(1).padStart(6)} GFLOP/s  x ${(time / reference).toFixed(2)}`,
    );
  }
}

function kernelContenders(N) {
  const kernel = waveKernel();
  const plan = kernel.keep(transformPlanBytes(N));
  const strips = kernel.keep(stripsBytes(N));
  const re = kernel.keep(4 * N * N);
  // A pad keeps a row's real and imaginary parts out of the same cache sets, as the row planes of a synthesis are.
  kernel.keep(256);
  const im = kernel.keep(4 * N * N);
  writeTransformPlan(kernel.buffer, plan, N);
  for (const plane of [re, im]) {
    const values = new Float32Array(kernel.buffer, plane, N * N);
    for (let i = 0; i < values.length; i++) values[i] = Math.random() - 0.5;
  }
  const transform = (inner) => {
    for (let row = 0; row < N; row++) {
      if (inner && row >= N / 4 && row < (3 * N) / 4) continue;
      const offset = 4 * N * row;
      kernel.program.transformRow(plan, re + offset, im + offset, strips, row, inner ? 1 : 0);
    }
    kernel.program.transformColumns(plan, strips, inner ? 1 : 0);
  };
  return {
    kernel: () => cpuTime(() => transform(false)),
    'kernel, inner': () => cpuTime(() => transform(true)),
  };
}

function float64Contender(N) {
  const engine = float64Engine(N);
  const data = new Float64Array(2 * N * N);
  return () => {
    for (let i = 0; i < data.length; i++) data[i] = Math.random() - 0.5;
    return cpuTime(() => engine.inverse(data), 1);
  };
}

/** CPU time of one call, us: the median of batches that last a few milliseconds each, over 0.3 s. */
function cpuTime(run, batches = Infinity) {
  const times = [];
  const start = performance.now();
  let repeats = 1;
  while (times.length < batches && performance.now() - start < 300) {
    const before = process.cpuUsage();
    for (let i = 0; i < repeats; i++) run();
    const { user, system } = process.cpuUsage(before);
    times.push((user + system) / repeats);
    if (batches === Infinity) repeats = Math.max(1, Math.round(4000 / Math.max(1, times[times.length - 1])));
  }
  return median(times);
}

function median(list) {
  const sorted = [...list].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)];
}

function compiledFftw() {
  const source = fileURLToPath(new URL('fftw.c', import.meta.url));
  const program = join(tmpdir(), `loopswell-fftw-${process.pid}`);
  const { status } = spawnSync('gcc', ['-O3', '-march=native', source, '-o', program, '-lfftw3f', '-lm']);
  if (status !== 0) console.error('FFTW is left out: gcc or libfftw3-dev is missing');
  return status === 0 ? program : null;
}
