import { color, interpolateLab, rgb } from 'd3';

export type MarkLook = 'dip' | 'artefact' | 'flare' | 'exclude';

/** Colours and faces of a plot, read once per theme change from the tokens of the page. */
export interface PlotTheme {
  readonly plot: string;
  readonly ground: string;
  readonly ink: string;
  readonly ink2: string;
  readonly ink3: string;
  readonly line: string;
  readonly line2: string;
  readonly flame: string;
  readonly axis: string;
  readonly tickText: string;
  readonly grid: string;
  readonly point: string;
  readonly bin: string;
  readonly trend: string;
  readonly flagged: string;
  readonly odd: string;
  readonly even: string;
  readonly mark: Readonly<Record<MarkLook, string>>;
  /** Case 1 is the first of eight. */
  readonly cases: readonly string[];
  /** Densities from few to many, packed as `packColour` does. */
  readonly density: Uint32Array;
  readonly font: string;
  readonly fontSymbol: string;
}

const DENSITY_LEVELS = 24;
const FAINTEST = 0.48;

export function readTheme(element: Element): PlotTheme {
  const style = getComputedStyle(element);
  return themeFrom((token) => style.getPropertyValue(token).trim());
}

/** @param token gives the text of a CSS custom property; what is no colour becomes grey, never the colour drawn last */
export function themeFrom(token: (name: string) => string): PlotTheme {
  const colour = (name: string) => colourOr(token(`--${name}`), 'gray');
  return {
    plot: colour('plot'),
    ground: colour('ground'),
    ink: colour('ink'),
    ink2: colour('ink-2'),
    ink3: colour('ink-3'),
    line: colour('line'),
    line2: colour('line-2'),
    flame: colour('flame'),
    axis: colour('axis'),
    tickText: colour('tick-text'),
    grid: colour('grid'),
    point: colour('point'),
    bin: colour('bin'),
    trend: colour('trend'),
    flagged: colour('flagged'),
    odd: colour('odd'),
    even: colour('even'),
    mark: {
      dip: colour('mark-dip'),
      artefact: colour('mark-artefact'),
      flare: colour('mark-flare'),
      exclude: colour('mark-exclude'),
    },
    cases: [1, 2, 3, 4, 5, 6, 7, 8].map((number) => colour(`case-${number}`)),
    density: densityRamp(
      token('--seq')
        .split(',')
        .map((stop) => stop.trim()),
    ),
    font: token('--font') || 'system-ui, sans-serif',
    fontSymbol: token('--font-symbol') || 'serif',
  };
}

/** One colour as it lies in the memory of an ImageData on a little-endian machine, opaque. */
export function packColour(colour: string): number {
  const { r, g, b } = rgb(colour);
  return ((255 << 24) | (Math.round(b) << 16) | (Math.round(g) << 8) | Math.round(r)) >>> 0;
}

/** Lab steps along the stops, from the first that still tells one point from the plot surface, about 3:1. */
function densityRamp(stops: readonly string[]): Uint32Array {
  const ramp = new Uint32Array(DENSITY_LEVELS);
  for (let level = 0; level < DENSITY_LEVELS; level += 1) {
    const place = (FAINTEST + ((1 - FAINTEST) * level) / (DENSITY_LEVELS - 1)) * (stops.length - 1);
    const stop = Math.max(0, Math.min(Math.floor(place), stops.length - 2));
    ramp[level] = packColour(
      interpolateLab(colourOr(stops[stop], 'gray'), colourOr(stops[stop + 1], 'gray'))(place - stop),
    );
  }
  return ramp;
}

function colourOr(text: string | undefined, otherwise: string): string {
  return text !== undefined && color(text) ? text : otherwise;
}
