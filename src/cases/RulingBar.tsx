import { RulingSign } from '../plot/RulingSign.tsx';
import { RULING_KINDS, type RulingKind } from '../session/document.ts';

const LINES: Readonly<Record<RulingKind, readonly [string, string]>> = {
  'worth telescope time': ['worth', 'telescope time'],
  'stellar mimic': ['stellar', 'mimic'],
  'not astrophysical': ['not', 'astrophysical'],
  'cannot decide': ['cannot', 'decide'],
};

/** Four equal cells, alike until one is chosen. */
export function RulingBar(props: {
  readonly chosen: RulingKind | undefined;
  readonly onChoose: (kind: RulingKind) => void;
}) {
  const { chosen, onChoose } = props;
  return (
    <fieldset className="ruling-bar">
      <legend className="visually-hidden">Ruling</legend>
      {RULING_KINDS.map((kind, index) => (
        <button key={kind} type="button" aria-pressed={kind === chosen} onClick={() => onChoose(kind)}>
          <span className="digit">{index + 1}</span>
          <RulingSign kind={kind} />
          <span>{LINES[kind][0]}</span>
          <span>{LINES[kind][1]}</span>
        </button>
      ))}
    </fieldset>
  );
}
