import type { ReactNode } from 'react';
import type { StarParameters } from '../core/light-curve.ts';
import { numberLabel } from '../plot/number-label.ts';
import { useBench } from '../store/use-candling.ts';

/** The target and its star, in the head line of the bench; the chips of its cases are given by the owner. */
export function TargetLine({ chips }: { readonly chips: ReactNode }) {
  const { target } = useBench();
  return (
    <header className="head-line target-line">
      <h1>{target?.label ?? 'No target selected'}</h1>
      {target && <StarWords star={target.star} />}
      <span className="spread" />
      {target && chips}
    </header>
  );
}

function StarWords({ star }: { readonly star: StarParameters }) {
  const { magnitude, magnitudeBand, teffK, teffErrorK, radiusSolar, radiusErrorSolar, densityCgs, densityErrorCgs } =
    star;
  const known = [magnitude, teffK, radiusSolar, densityCgs].some((value) => value !== undefined);
  if (!known) return <span className="star quiet">star parameters not known</span>;
  return (
    <>
      {magnitude !== undefined && (
        <span className="star">
          <em>{numberLabel(magnitude, 2)}</em> {magnitudeBand ?? 'mag'}
        </span>
      )}
      <Quantity symbol="T" index="eff" value={teffK} error={teffErrorK} decimals={0} unit="K" />
      <Quantity symbol="R" index="s" value={radiusSolar} error={radiusErrorSolar} decimals={2} unit={<SolarRadius />} />
      <Quantity symbol="ρ" index="s" value={densityCgs} error={densityErrorCgs} decimals={2} unit="g cm⁻³" />
    </>
  );
}

function Quantity(props: {
  readonly symbol: string;
  readonly index: string;
  readonly value: number | undefined;
  readonly error: number | undefined;
  readonly decimals: number;
  readonly unit: ReactNode;
}) {
  const { symbol, index, value, error, decimals, unit } = props;
  if (value === undefined) return null;
  return (
    <span className={`star star-${index}-${symbol === 'ρ' ? 'density' : symbol}`}>
      <span className="symbol">{symbol}</span>
      <sub>{index}</sub>{' '}
      <em className="number">
        {numberLabel(value, decimals)}
        {error !== undefined && ` ± ${numberLabel(error, decimals)}`}
      </em>{' '}
      {unit}
    </span>
  );
}

function SolarRadius() {
  return (
    <>
      R
      <svg className="sun-sign" viewBox="-5 -5 10 10" role="img" aria-label="solar radii">
        <circle r="4.4" fill="none" stroke="currentColor" />
        <circle r="1.2" fill="currentColor" />
      </svg>
    </>
  );
}
