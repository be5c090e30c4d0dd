import { spawn } from 'node:child_process';
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const CHECKOUT = fileURLToPath(new URL('../..', import.meta.url));
/** The built program: Node 20 runs no TypeScript, and this is what users run. */
export const PROGRAM = join(CHECKOUT, 'dist/main/cli/quietboard.js');

export interface CliRun {
  readonly code: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** Runs the built command line to its end. */
export function runCli(args: readonly string[], nodeArgs: readonly string[] = []): Promise<CliRun> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [...nodeArgs, PROGRAM, ...args], { cwd: CHECKOUT });
    let [stdout, stderr] = ['', ''];
    child.stdout.setEncoding('utf8').on('data', (text: string) => (stdout += text));
    child.stderr.setEncoding('utf8').on('data', (text: string) => (stderr += text));
    child.on('error', reject);
    child.on('close', (code) => resolve({ code, stdout, stderr }));
  });
}

/** A new folder of the test's own, and a writer into it. */
export function testFolder(): { folder: string; write: (name: string, content: unknown) => string } {
  const folder = mkdtempSync(join(tmpdir(), 'quietboard-test-'));
  const write = (name: string, content: unknown): string => {
    const file = join(folder, name);
    const isRaw = typeof content === 'string' || content instanceof Uint8Array;
    writeFileSync(file, isRaw ? content : JSON.stringify(content));
    return file;
  };
  return { folder, write };
}
