import type { Handlers } from '../../../app/contract/procedures.ts';
import { runJob } from '../../jobs/run-job.ts';
import { partsOf } from '../bases.ts';
import type { HostContext } from '../context.ts';

type BoardHandlers = Pick<Handlers, 'file.upload' | 'board.open' | 'base.put' | 'base.get'>;

export function boardHandlers({ projects, bases, uploads, jobs }: HostContext): BoardHandlers {
  return {
    'file.upload': async ({ name, bytes }) => ({
      uploadId: await uploads.add(name, bytes),
      sizeBytes: bytes.length,
    }),
    'board.open': ({ projectId, jobId, uploadIds, onto }) =>
      jobs.run(jobId, ({ signal, onProgress }) =>
        uploads.take(uploadIds, async (files) => {
          const before = onto && bases.document(projects.get(projectId), onto);
          const stage = `Reading ${files.map(({ name }) => name).join(', ')}`;
          const input = { files: files.map(({ path, name }) => ({ path, name })), ...(before && { onto: before }) };
          const opened = await runJob('open files', input, (done, total) => onProgress(stage, done, total), signal);
          const { base, sources } = partsOf(opened.document);
          return { baseId: bases.put(base), base, sources, ...(opened.summary && { summary: opened.summary }) };
        }),
      ),
    'base.put': async ({ base }) => ({ baseId: bases.put(base) }),
    'base.get': async ({ projectId, baseId }) => ({ base: bases.get(projects.get(projectId), baseId) }),
  };
}
