import { type Span, wideSpan } from './span.ts';

/** Value to pixel along one axis. Plain numbers, so that hot loops can inline it. */
export interface Scale {
  readonly kind: 'linear' | 'log';
  readonly domain: Span;
  /** Pixels of the domain's ends; descending for a y axis. */
  readonly range: readonly [firstPx: number, lastPx: number];
  /** Pixels per unit of value, or per unit of natural logarithm. */
  readonly slope: number;
}

export function linearScale(domain: Span, range: readonly [number, number]): Scale {
  const safe = wideSpan(domain[0], domain[1]);
  return { kind: 'linear', domain: safe, range, slope: (range[1] - range[0]) / (safe[1] - safe[0]) };
}

/** The domain must be over zero; what is not becomes 0.1 to 10. */
export function logScale(domain: Span, range: readonly [number, number]): Scale {
  const [first, last] = domain;
  const safe: Span = first > 0 && last / first > 1 + 1e-12 && Number.isFinite(last / first) ? domain : [0.1, 10];
  return { kind: 'log', domain: safe, range, slope: (range[1] - range[0]) / Math.log(safe[1] / safe[0]) };
}

export function toPx(scale: Scale, value: number): number {
  const { kind, domain, range, slope } = scale;
  return range[0] + slope * (kind === 'log' ? Math.log(value / domain[0]) : value - domain[0]);
}

export function toValue(scale: Scale, px: number): number {
  const { kind, domain, range, slope } = scale;
  const along = (px - range[0]) / slope;
  return kind === 'log' ? domain[0] * Math.exp(along) : domain[0] + along;
}
