/** A dip in an egg held before a light: invented points, the product's one picture. */
const POINTS = Array.from({ length: 120 }, (_, index) => {
  const x = index / 119;
  const edge = Math.min(1, Math.max(0, (0.24 - Math.abs(x - 0.5)) / 0.06));
  const scatter = Math.sin(index * 12.9898) * 43758.5453;
  return { x: 18 + x * 264, y: 214 + edge * 56 + (scatter - Math.floor(scatter) - 0.5) * 11 };
});

export function Egg() {
  return (
    <svg className="egg" viewBox="0 0 300 432" aria-hidden="true">
      <defs>
        <radialGradient id="glow" cx="0.5" cy="0.62" r="0.62">
          <stop offset="0" stopColor="var(--egg-heart)" />
          <stop offset="0.45" stopColor="var(--egg-body)" />
          <stop offset="1" stopColor="var(--egg-edge)" />
        </radialGradient>
      </defs>
      <path
        d="M150 6C232 6 296 138 296 238A146 152 0 0 1 4 238C4 138 68 6 150 6Z"
        fill="url(#glow)"
        stroke="var(--edge)"
        strokeWidth="1"
      />
      <text x="150" y="132" textAnchor="middle">
        drop files here
      </text>
      {POINTS.map(({ x, y }) => (
        <circle key={x} cx={x} cy={y} r="1.3" fill="var(--bin)" />
      ))}
      <g className="egg-scale">
        <path d="M1 416H299" />
        {[0, 1, 2, 3, 4, 5, 6, 7].map((tick) => (
          <path key={tick} d={`M${1 + (tick * 298) / 8} 409V416`} />
        ))}
        {[0, 2, 4, 6].map((segment) => (
          <rect key={segment} x={1 + (segment * 298) / 8} y="416" width={298 / 8} height="3" />
        ))}
      </g>
    </svg>
  );
}
