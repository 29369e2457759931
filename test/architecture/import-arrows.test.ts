import { readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { cruise, type ICruiseResult } from 'dependency-cruiser';
import { describe, expect, it } from 'vitest';

const ROOT = new URL('../..', import.meta.url).pathname;

/** Which folder may import which: the arrows of the house. A folder may always import from itself. */
const ARROWS: Readonly<Record<string, readonly string[]>> = {
  'src/core': [],
  'src/contract': ['src/core'],
  'src/session': ['src/core'],
  'src/jobs': ['src/contract', 'src/core'],
  'src/store': ['src/session', 'src/jobs', 'src/contract', 'src/core'],
  'src/plot': ['src/core'],
  'src/intake': ['src/store', 'src/plot', 'src/session', 'src/contract', 'src/core'],
  'src/docket': ['src/store', 'src/plot', 'src/session', 'src/contract', 'src/core'],
  'src/bench': ['src/store', 'src/plot', 'src/session', 'src/contract', 'src/core'],
  'src/cases': ['src/store', 'src/plot', 'src/session', 'src/contract', 'src/core'],
  'src/records': ['src/store', 'src/plot', 'src/session', 'src/contract', 'src/core'],
  'src/app': ['src/'],
  workers: ['src/core', 'src/contract'],
  'workers/batch': ['workers/', 'src/session', 'src/contract', 'src/core'],
};

async function readImports(): Promise<ICruiseResult> {
  const { output } = await cruise(
    ['src', 'workers'],
    {
      baseDir: ROOT,
      tsPreCompilationDeps: true,
      doNotFollow: { path: 'node_modules' },
      exclude: { path: 'node_modules' },
    },
    { extensions: ['.ts', '.tsx', '.css'] } as never,
  );
  return output as ICruiseResult;
}

const folderOf = (path: string) => {
  const folder = path.split('/').slice(0, 2).join('/');
  return path.startsWith('workers/') && folder !== 'workers/batch' ? 'workers' : folder;
};

const { modules } = await readImports();
const own = modules.filter(({ source }) => /^(src|workers)\//.test(source));

describe('the house', () => {
  it('is seen at all', () => {
    // A reader that understands no TypeScript finds nothing and would pass everything.
    expect(own.length).toBeGreaterThan(150);
    expect(own.flatMap(({ dependencies }) => dependencies).length).toBeGreaterThan(400);
  });

  it('has only the arrows that are drawn', () => {
    const illegal = own.flatMap(({ source, dependencies }) => {
      const from = folderOf(source);
      return dependencies
        .map(({ resolved }) => resolved)
        .filter((resolved) => /^(src|workers)\//.test(resolved))
        .filter((resolved) => folderOf(resolved) !== from)
        .filter((resolved) => !ARROWS[from]?.some((allowed) => resolved.startsWith(allowed)))
        .map((resolved) => `${source} -> ${resolved}`);
    });
    expect(illegal).toEqual([]);
  });

  it('has no import cycles', () => {
    const circular = own.flatMap(({ source, dependencies }) =>
      dependencies.filter((dependency) => dependency.circular).map(({ resolved }) => `${source} -> ${resolved}`),
    );
    expect(circular).toEqual([]);
  });

  it('keeps React out of numbers, documents and workers', () => {
    const mixed = own.filter(
      ({ source, dependencies }) =>
        /^(workers|src\/(core|contract|session|jobs))\//.test(source) &&
        dependencies.some(({ module }) => /^(react|react-dom|zustand|d3)$/.test(module)),
    );
    expect(mixed.map(({ source }) => source)).toEqual([]);
  });

  it('keeps worker entries thin', () => {
    const entries = own.filter(({ source }) => /^workers\/[^/]+\.worker\.ts$/.test(source));
    expect(entries.length).toBeGreaterThanOrEqual(3);
    for (const { source } of entries) expect(statSync(join(ROOT, source)).size).toBeLessThan(1200);
  });

  it('has only the folders that are drawn, each saying what lives in it', () => {
    const folders = readdirSync(join(ROOT, 'src'), { withFileTypes: true }).filter((entry) => entry.isDirectory());
    expect(folders.map(({ name }) => `src/${name}`).sort()).toEqual(
      Object.keys(ARROWS)
        .filter((name) => name.startsWith('src/'))
        .sort(),
    );
    for (const { name } of folders) expect(readdirSync(join(ROOT, 'src', name))).toContain('README.md');
  });
});
