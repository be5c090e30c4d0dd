#!/usr/bin/env node
import { guardProcess, reportFailure } from './exit.ts';
import { buildProgram } from './program.ts';

guardProcess();
try {
  await buildProgram().parseAsync();
} catch (error) {
  process.exitCode = reportFailure(error);
}
