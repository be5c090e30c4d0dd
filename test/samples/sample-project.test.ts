import { copyFileSync, mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { canonicalJson } from '../../app/project/exact-json.ts';
import { Project } from '../../main/db/project.ts';
import { loadBoard } from '../../main/files/load-board.ts';

/** The project that comes with the program against the sample's own files; `npm run sample-project` makes it again. */

const SAMPLE = 'samples/valve-controller';

function openCopy(): Project {
  const copy = join(mkdtempSync(join(tmpdir(), 'quietboard-sample-')), 'copy.quietboard');
  copyFileSync(`${SAMPLE}/three-revisions.quietboard`, copy);
  return Project.open(copy);
}

it('holds the three revisions, made of the files beside it', async () => {
  const project = openCopy();
  try {
    expect(project.doctor().findings.filter(({ isFine }) => !isFine)).toEqual([]);
    expect(project.runs().map(({ run, revision }) => `${run} ${revision}`)).toEqual(['3 C', '2 B', '1 A']);
    for (const { run, revision } of project.runs()) {
      const stem = `${SAMPLE}/rev-${revision.toLowerCase()}`;
      const { document } = await loadBoard(`${stem}.board.json`, `${stem}.sources.json`);
      expect(canonicalJson(project.run(run).document)).toBe(canonicalJson(document));
    }
  } finally {
    project.close();
  }
});

it('shows what its page says: over, within uncertainty, fine', () => {
  const project = openCopy();
  try {
    expect(project.runs().map(({ verdict }) => verdict)).toEqual(['meets', 'within-uncertainty', 'exceeds']);
  } finally {
    project.close();
  }
});
