import { Argument, type Command } from 'commander';
import { z } from 'zod';
import { boardFileSchema, sourcesFileSchema } from '../../../app/board/board-file.ts';
import { resultSchema } from '../../../app/estimate/result-schema.ts';
import { fieldJobSchema } from '../../../app/fields/field-job.ts';
import { jsonText } from '../../files/json-text.ts';

const SCHEMAS = {
  board: { title: 'Quietboard board file', schema: boardFileSchema, io: 'input' },
  sources: { title: 'Quietboard sources file', schema: sourcesFileSchema, io: 'input' },
  result: { title: 'Quietboard result', schema: resultSchema, io: 'output' },
  field: { title: 'Quietboard field job', schema: fieldJobSchema, io: 'input' },
} as const;

const HELP = `
Examples:
  quietboard schema board > board.schema.json
  quietboard schema sources

An editor that knows JSON Schema checks and completes your files with it. What
goes beyond a schema (names that must exist, ramps that must fit) is checked
when the file is read.
`;

export function addSchema(program: Command): void {
  program
    .command('schema')
    .summary('JSON Schema of a file')
    .description('Prints the JSON Schema (draft 2020-12) of one of the files this program reads or writes.')
    .addArgument(new Argument('<file>', 'which file').choices(Object.keys(SCHEMAS)))
    .addHelpText('after', HELP)
    .action((file: keyof typeof SCHEMAS) => {
      const { title, schema, io } = SCHEMAS[file];
      process.stdout.write(jsonText({ title, ...z.toJSONSchema(schema, { io }) }));
    });
}
