import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { seedRandom } from '../reference/search/seeded-series.ts';

const SIGMA = 5e-4;

interface Dips {
  readonly periodDays: number;
  readonly epochDays: number;
  readonly durationDays: number;
  readonly depth: number;
}

/** A comma-separated light curve of 20 days at 40 minutes with white noise and boxes. */
export function writtenCurve(seed: number, dips: readonly Dips[]): string {
  const random = seedRandom(seed);
  const lines = ['bjd_tdb,flux,flux_err'];
  for (let i = 0; i < 720; i += 1) {
    const days = i / 36;
    const lost = dips.filter(({ periodDays, epochDays, durationDays }) => {
      const cycles = (days - epochDays) / periodDays;
      return Math.abs(cycles - Math.round(cycles)) * periodDays <= durationDays / 2;
    });
    const flux = 1 + SIGMA * random.normal() - lost.reduce((sum, { depth }) => sum + depth, 0);
    lines.push(`${(2_459_000 + days).toFixed(6)},${flux.toFixed(7)},${SIGMA}`);
  }
  return `${lines.join('\n')}\n`;
}

export const TWO_DIPS: readonly Dips[] = [
  { periodDays: 2.2, epochDays: 0.7, durationDays: 0.13, depth: 0.004 },
  { periodDays: 3.7, epochDays: 1.3, durationDays: 0.15, depth: 0.003 },
];

/** A folder of two light curves, one of them with two signals, a broken one, a copy, a stars table and a text. */
export function writeNight(): string {
  const folder = mkdtempSync(join(tmpdir(), 'candling-night-'));
  const write = (name: string, text: string): void => writeFileSync(join(folder, name), text);
  write('b-two.csv', writtenCurve(2, TWO_DIPS));
  write('a-quiet.csv', writtenCurve(1, []));
  write('c-broken.csv', 'time,flux\n1,1,1,1\n2,2,2,2\n');
  write('d-copy.csv', writtenCurve(2, TWO_DIPS));
  write('stars.csv', 'target,teff_k,density_gcc\nB-TWO,5800,1.2\n');
  write('notes.txt', 'Clouds came up at two, and went.\nWe closed.\n');
  return folder;
}
