#!/usr/bin/env node
import { processIo } from './process-io.ts';
import { run } from './program.ts';

// The status is set and not forced, so that everything written still goes out.
process.exitCode = await run(process.argv.slice(2), processIo());
