import type { Handlers } from '../../../app/contract/procedures.ts';
import { readMeasurement } from '../../files/measurement-file.ts';
import type { HostContext } from '../context.ts';

type MeasurementHandlers = Pick<Handlers, 'measurements.list' | 'measurements.add' | 'measurements.delete'>;

export function measurementHandlers({ projects, uploads, events }: HostContext): MeasurementHandlers {
  const changed = (projectId: string) => {
    events.publish('project.changed', { projectId, what: 'measurements', clientId: null });
  };
  return {
    'measurements.list': async ({ projectId }) => ({ measurements: projects.get(projectId).measurements() }),
    'measurements.add': ({ projectId, uploadId, name, revision }) =>
      uploads.take([uploadId], async ([upload]) => {
        const project = projects.get(projectId);
        const points = await readMeasurement(upload!.path, upload!.name);
        const measurement = project.addMeasurement({ name, revision, source: upload!.name, points });
        changed(projectId);
        return { measurement };
      }),
    'measurements.delete': async ({ projectId, id }) => {
      projects.get(projectId).deleteMeasurement(id);
      changed(projectId);
      return {};
    },
  };
}
