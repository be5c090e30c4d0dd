import { join } from 'node:path';
import Database from 'better-sqlite3';
import { expect, it } from 'vitest';
import { trendRunOf } from '../../../app/compare/trend-run.ts';
import { Project } from '../../../main/db/project.ts';
import { appFailure } from '../../support/app-failure.ts';
import { resultOf, SETTINGS, sampleDocument, sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

function projectOfThree(): Project {
  const project = Project.open(join(temporaryFolder(), 'board.quietboard'), { create: true });
  project.addRun(sampleRun('a'));
  project.addRun(sampleRun('b', { settings: { ...SETTINGS, standard: 'a rule that has gone' } }));
  const none = resultOf(sampleDocument('c'), { points: [], worst: null });
  project.addRun(sampleRun('c', { result: none, startedAt: '2026-01-01T00:00:00.000Z' }));
  return project;
}

it('keeps with every run what its trend needs, the same as the whole run gives', () => {
  const project = projectOfThree();
  const kept = project.trendRuns();
  expect(kept).toEqual(
    project
      .runs()
      .reverse()
      .map(({ run }) => trendRunOf(project.run(run))),
  );
  expect(kept[0]!.bands.length).toBeGreaterThan(1);
  // Of a standard that this version does not know the bands are unknown.
  expect(kept[1]!.bands).toEqual([]);
  expect(kept[2]!.worst).toBeNull();

  const copy = Project.importJson(join(temporaryFolder(), 'copy.quietboard'), project.exportJson());
  expect(copy.trendRuns()).toEqual(kept);
  for (const one of [project, copy]) one.close();
});

it('a damaged one is told by run, and by the examination', () => {
  const project = projectOfThree();
  const db = new Database(project.file);
  db.exec("UPDATE run SET trend = x'514250' WHERE run = 2");
  db.close();
  expect(appFailure(() => project.trendRuns()).message).toContain('is damaged (trend of run 2 is no packed data)');
  expect(project.doctor().findings.filter(({ isFine }) => !isFine)).toEqual([
    { code: 'trend', isFine: false, message: 'trend of run 2 is no packed data' },
  ]);
  expect(project.run(2).run).toBe(2);
  project.close();
});
