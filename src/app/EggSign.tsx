/** The egg before the light: the product's sign. */
export function EggSign() {
  return (
    <svg width="15" height="19" viewBox="0 0 15 19" aria-hidden="true">
      <path
        d="M7.5.8C11 .8 14.2 6.4 14.2 11A6.7 6.9 0 0 1 .8 11C.8 6.4 4 .8 7.5.8Z"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.3"
      />
      <circle cx="7.5" cy="11.5" r="2.4" fill="var(--flame)" />
    </svg>
  );
}
