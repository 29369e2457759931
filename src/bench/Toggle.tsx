/** A choice among a few, all in sight. */
export function Toggle<T extends string>(props: {
  readonly legend: string;
  readonly value: T;
  readonly options: readonly T[];
  /** Where an option is called otherwise on the screen. */
  readonly words?: Partial<Record<T, string>>;
  readonly onChoose: (option: T) => void;
}) {
  const { legend, value, options, words, onChoose } = props;
  return (
    <fieldset className="toggle">
      <legend className="visually-hidden">{legend}</legend>
      {options.map((option) => (
        <button key={option} type="button" aria-pressed={option === value} onClick={() => onChoose(option)}>
          {words?.[option] ?? option}
        </button>
      ))}
    </fieldset>
  );
}
