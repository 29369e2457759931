import { describe, expect, it } from 'vitest';
import { makeDensityGrid } from '../../src/plot/density-grid.ts';
import { drawPoints } from '../../src/plot/points-layer.ts';
import { saveAsSvg } from '../../src/plot/save-figure.ts';
import { drawStrip, type StripScene, stripFrame } from '../../src/plot/strip-scene.ts';
import { SvgContext } from '../../src/plot/svg-context.ts';
import { seededNoise } from './seeded-noise.ts';
import { TEST_THEME } from './test-theme.ts';

/** Throws where tags do not nest, attributes are not quoted, or text holds a bare < or &. */
function expectWellFormed(xml: string): string[] {
  const open: string[] = [];
  const tags: string[] = [];
  const token = /<(\/?)([A-Za-z]\w*)((?:\s+[\w:-]+="[^"<]*")*)\s*(\/?)>|([^<]+)|(<)/g;
  for (const [, closing, name, attributes, selfClosing, text, bare] of xml.matchAll(token)) {
    if (bare) throw new Error('a bare < or a tag that cannot be read');
    if (/&(?!amp;|lt;|gt;|quot;|#)/.test(text ?? attributes ?? '')) throw new Error(`bare & in ${text ?? attributes}`);
    if (name === undefined) continue;
    if (closing) expect(open.pop()).toBe(name);
    else {
      tags.push(name);
      if (!selfClosing) open.push(name);
    }
  }
  expect(open).toEqual([]);
  return tags;
}

const noise = seededNoise(7);
const time = Float64Array.from({ length: 400 }, (_, i) => 1200 + i * 0.05);

const scene: StripScene = {
  series: { time, values: time.map(() => 300 * noise()) },
  dropped: { time: Float64Array.of(1203.3), values: Float64Array.of(2000) },
  trend: time.map((t) => 100 * Math.sin(t)),
  yTitle: 'flux & trend / "ppm"',
  timeTitle: 'BJD_TDB − 2 459 000 / d',
  marks: [],
  lanes: [{ caseNumber: 2, selected: true, durationDays: 0.1, events: [{ cycle: 3, timeDays: 1205, hasData: true }] }],
  view: [1200, 1220],
  fullSpan: [1200, 1220],
  tool: 'pan',
  themeKey: 'test',
  label: 'Strip of invented data, a < b',
};

describe('a strip as SVG', () => {
  const size = { widthPx: 600, heightPx: 260 };
  const svg = saveAsSvg(
    (context) => drawStrip(context, stripFrame(scene, size), scene, TEST_THEME),
    size,
    scene.label,
    '#fff',
  );

  it('is well formed, with text as text', () => {
    const tags = expectWellFormed(svg);
    expect(tags[0]).toBe('svg');
    expect(tags).toContain('text');
    expect(svg).toContain('<title>Strip of invented data, a &lt; b</title>');
    expect(svg).toContain('>flux &amp; trend / &quot;ppm&quot;</text>');
    expect(svg).toContain('>TDB</text>');
    expect(svg).toContain('>1\u00a0210</text>');
    expect(svg).toContain('>3</text>');
  });
  it('holds one square a point, and no number that is none', () => {
    expect(svg.match(/fill="#ff0000"/g)).toHaveLength(400);
    expect(svg).not.toMatch(/NaN|Infinity|undefined/);
  });
});

describe('SvgContext', () => {
  it('writes a dense plot as coloured runs that cover exactly the painted pixels', () => {
    const n = 5000;
    const dense = {
      x: Float64Array.from({ length: n }, (_, i) => 1200 + i * 0.004),
      y: Float64Array.from({ length: n }, () => noise()),
    };
    const size = { widthPx: 300, heightPx: 120 };
    const frame = stripFrame({ ...scene, series: { time: dense.x, values: dense.y }, lanes: [] }, size);
    const grid = makeDensityGrid();
    const context = new SvgContext('t');
    drawPoints(context, frame, { ...dense, from: 0, to: n, inside: n, outside: 'edge' }, TEST_THEME, grid);
    const svg = context.toSvg(size.widthPx, size.heightPx, 'dense');
    expectWellFormed(svg);
    const covered = [...svg.matchAll(/h(\d+)/g)].reduce((sum, [, run]) => sum + Number(run), 0);
    expect(covered).toBe(grid.counts.reduce((sum, count) => sum + (count > 0 ? 1 : 0), 0));
  });
  it('nests clips, restores the pen, and escapes', () => {
    const context = new SvgContext('x');
    context.save();
    context.beginPath();
    context.rect(0, 0, 10, 10);
    context.clip();
    context.beginPath();
    context.arc(5, 5, 2, 0, 2 * Math.PI);
    context.clip();
    context.fillStyle = 'rgb(1,2,3)';
    context.fillRect(0, 0, 4, 4);
    context.restore();
    context.fillText('a<b & "c"', 1, 2);
    const svg = context.toSvg(20, 20, 'clips');
    expectWellFormed(svg);
    expect(svg).toContain('<clipPath id="x-clip-2" clip-path="url(#x-clip-1)">');
    expect(svg).toMatch(/<g clip-path="url\(#x-clip-2\)">\s*<rect [^>]*rgb\(1,2,3\)[^>]*\/>\s*<\/g>/);
    expect(svg).toContain('fill="#000">a&lt;b &amp; &quot;c&quot;</text>');
  });
  it('closes a full circle through two half arcs', () => {
    const context = new SvgContext('c');
    context.beginPath();
    context.arc(10, 10, 4, 0, 7);
    context.fill();
    expect(context.toSvg(20, 20, '')).toContain('d="M14 10A4 4 0 0 1 6 10A4 4 0 0 1 14 10"');
  });
});
