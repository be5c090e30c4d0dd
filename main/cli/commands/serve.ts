import type { Command } from 'commander';
import { serve } from '../../web/serve.ts';
import { EXIT_DONE, onInterrupt } from '../exit.ts';
import { wholeNumberWithin } from '../numbers.ts';

const HELP = `
The address holds a token that changes with every start: whoever knows it can
use the program as you, so do not pass it on. Nothing but this machine can
reach the address.

Examples:
  quietboard serve
  quietboard serve --project valve.quietboard --no-open

Ctrl-C ends it.
`;

export interface ServeCommandOptions {
  readonly project?: string;
  readonly port: number;
  readonly open: boolean;
}

export function addServe(program: Command): void {
  program
    .command('serve')
    .summary('the user interface, in a browser window')
    .description('Serves the user interface to this machine and opens it in a browser window.')
    .option('--project <file>', 'project to open; made when it is absent')
    .option('--port <n>', 'port on 127.0.0.1; 0 for any free one', wholeNumberWithin(0, 65535), 0)
    .option('--no-open', 'print the address only')
    .addHelpText('after', HELP)
    .action(runServe);
}

async function runServe(options: ServeCommandOptions): Promise<void> {
  const stop = new AbortController();
  onInterrupt(() => stop.abort());
  await serve({
    port: options.port,
    ...(options.project !== undefined && { startFile: options.project }),
    opensWindow: options.open,
    endsWithWindows: false,
    onAddress: (address) => process.stdout.write(`Serving ${address}\n`),
    onNoWindow: () =>
      process.stderr.write(
        'No browser window could be opened (looked for one of the Chromium family): open the address yourself.\n',
      ),
    signal: stop.signal,
  });
  process.exitCode = EXIT_DONE;
}
