import { readdirSync } from 'node:fs';
import { cruise, type ICruiseResult } from 'dependency-cruiser';
import { describe, expect, it } from 'vitest';
import configuration from '../../.dependency-cruiser.cjs';

const FOLDERS = ['app', 'main', 'renderer', 'test'];

function sourceFiles(): string[] {
  return FOLDERS.flatMap((folder) =>
    readdirSync(folder, { recursive: true, encoding: 'utf8' })
      .filter((file) => /\.tsx?$/.test(file))
      .map((file) => `${folder}/${file}`),
  );
}

const { forbidden, options } = configuration;
const { modules, summary } = (await cruise(FOLDERS, { ...options, validate: true, ruleSet: { forbidden } }))
  .output as ICruiseResult;

describe('who may import whom', () => {
  it('app is pure, main and renderer never meet, no cycles; the checker saw every source file', () => {
    expect(summary.violations.map(({ rule, from, to }) => `${rule.name}: ${from} → ${to}`)).toEqual([]);
    const seen = new Set(modules.map(({ source }) => source));
    const files = sourceFiles();
    expect(files.length).toBeGreaterThan(150);
    expect(files.filter((file) => !seen.has(file))).toEqual([]);
  });

  it('type-only imports count: the estimate sees the result type', () => {
    const judge = modules.find(({ source }) => source === 'app/estimate/points.ts')!;
    expect(judge.dependencies.map(({ resolved }) => resolved)).toContain('app/estimate/result.ts');
  });
});
