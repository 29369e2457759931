import { useEffect, useRef, useState } from 'react';
import type { ColumnPreview } from '../contract/read-contract.ts';
import type { ColumnAssignment, ColumnRole, FileMapping } from '../core/file-mapping.ts';
import type { FluxUnit, StampConvention, TimeFrame, TimeScale } from '../core/light-curve.ts';
import { useCandling, useView } from '../store/use-candling.ts';
import type { MappingQuestion } from '../store/view-store.ts';
import { assignRole, changeColumn, whyNotReadable } from './edit-mapping.ts';

const ROLES: readonly ColumnRole[] = ['time', 'flux', 'flux error', 'quality', 'covariate', 'ignore'];
const FLUX_UNITS: readonly FluxUnit[] = ['relative', 'electron/s', 'ppm', 'magnitude', 'sigma', 'unknown'];
const SCALES: readonly TimeScale[] = ['TDB', 'TT', 'UTC', 'TAI', 'unknown'];
const FRAMES: readonly TimeFrame[] = ['barycentric', 'heliocentric', 'geocentric', 'unknown'];
const STAMPS: readonly StampConvention[] = ['start', 'middle', 'end', 'unknown'];
const MINUTES = 1440;

/** What the columns of a file are taken for: the reader's guess with its reasons, to be confirmed or corrected. */
export function MappingForm() {
  const question = useView((state) => state.mappingQuestions[0]);
  return question === undefined ? null : <OneMapping key={question.fileName} question={question} />;
}

function OneMapping({ question }: { readonly question: MappingQuestion }) {
  const { files } = useCandling();
  const waiting = useView((state) => state.mappingQuestions.length);
  const dialog = useRef<HTMLDialogElement>(null);
  const [mapping, setMapping] = useState(question.mapping);
  const readButton = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    dialog.current?.showModal();
    readButton.current?.focus();
  }, []);
  const problem = whyNotReadable(mapping);
  const { read, fileName } = question;
  const answer = (alike: boolean) => {
    if (problem === undefined) void files.answer(question, mapping, alike);
  };
  return (
    <dialog
      ref={dialog}
      className="sheet mapping"
      aria-label={`Columns of ${fileName}`}
      onCancel={() => files.dismissQuestion(question)}
    >
      <form
        onSubmit={(event) => {
          event.preventDefault();
          answer(false);
        }}
      >
        <header className="head-line">
          <h2>Columns of {fileName}</h2>
        </header>
        <div className="sheet-body">
          {read.kind === 'question' && <p className="notice">{read.sentence}</p>}
          <ColumnTable columns={read.columns} mapping={mapping} onChange={setMapping} />
          <TimeFields mapping={mapping} onChange={setMapping} />
          {problem !== undefined && <p className="notice">{problem}</p>}
          <div className="sheet-actions">
            <button type="button" className="button" onClick={() => files.dismissQuestion(question)}>
              <kbd>Esc</kbd> {question.targetId === undefined ? 'Leave the file out' : 'Keep as it was'}
            </button>
            {waiting > 1 && (
              <button type="button" className="button" disabled={problem !== undefined} onClick={() => answer(true)}>
                Read all files with these columns
              </button>
            )}
            <button ref={readButton} type="submit" className="button primary" disabled={problem !== undefined}>
              <kbd>Enter</kbd> Read with these columns
            </button>
          </div>
        </div>
      </form>
    </dialog>
  );
}

interface Editing {
  readonly mapping: FileMapping;
  readonly onChange: (mapping: FileMapping) => void;
}

function ColumnTable({ columns, mapping, onChange }: Editing & { readonly columns: readonly ColumnPreview[] }) {
  return (
    <div className="column-table">
      <table>
        <thead>
          <tr>
            <th scope="col">column</th>
            <th scope="col">first values</th>
            <th scope="col">taken for</th>
            <th scope="col">because</th>
          </tr>
        </thead>
        <tbody>
          {columns.map((preview) => {
            const assignment = mapping.columns.find(({ column }) => column === preview.name);
            if (assignment === undefined) return null;
            return (
              <tr key={preview.name}>
                <th scope="row">
                  {preview.name}
                  {preview.unit && <span className="quiet"> / {preview.unit}</span>}
                </th>
                <td className="number">{preview.sample.join('  ')}</td>
                <td>
                  <select
                    className="field"
                    aria-label={`${preview.name} is`}
                    value={assignment.role}
                    onChange={(event) => onChange(assignRole(mapping, preview.name, event.target.value as ColumnRole))}
                  >
                    {ROLES.map((role) => (
                      <option key={role}>{role}</option>
                    ))}
                  </select>
                  <RoleDetail assignment={assignment} mapping={mapping} onChange={onChange} />
                </td>
                <td className="quiet">{assignment.reason}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

function RoleDetail({ assignment, mapping, onChange }: Editing & { readonly assignment: ColumnAssignment }) {
  const { column, role } = assignment;
  if (role === 'flux')
    return (
      <select
        className="field"
        aria-label={`unit of ${column}`}
        value={assignment.unit ?? 'unknown'}
        onChange={(event) => onChange(changeColumn(mapping, column, { unit: event.target.value as FluxUnit }))}
      >
        {FLUX_UNITS.map((unit) => (
          <option key={unit}>{unit}</option>
        ))}
      </select>
    );
  if (role !== 'flux error') return null;
  return (
    <select
      className="field"
      aria-label={`${column} is the error of`}
      value={assignment.errorOf ?? ''}
      onChange={(event) => onChange(changeColumn(mapping, column, { errorOf: event.target.value || undefined }))}
    >
      <option value="">of every flux</option>
      {mapping.columns
        .filter((other) => other.role === 'flux')
        .map((flux) => (
          <option key={flux.column} value={flux.column}>
            of {flux.column}
          </option>
        ))}
    </select>
  );
}

function TimeFields({ mapping, onChange }: Editing) {
  const { timeReference, timeUnit, stamp, passband, exposureDays } = mapping;
  const setReference = (change: Partial<FileMapping['timeReference']>) =>
    onChange({ ...mapping, timeReference: { ...timeReference, ...change } });
  return (
    <div className="time-fields">
      <Choice
        label="time in"
        value={timeUnit}
        options={['day', 'second']}
        onChoose={(unit) => onChange({ ...mapping, timeUnit: unit })}
      />
      <label>
        counts from JD
        <input
          className="field"
          inputMode="decimal"
          placeholder="unknown"
          defaultValue={timeReference.zeroJd ?? ''}
          onChange={(event) => {
            const typed = event.target.value.trim();
            const zeroJd = typed === '' || !Number.isFinite(Number(typed)) ? undefined : Number(typed);
            setReference({ zeroJd });
          }}
        />
      </label>
      <Choice
        label="scale"
        value={timeReference.scale}
        options={SCALES}
        onChoose={(scale) => setReference({ scale })}
      />
      <Choice
        label="frame"
        value={timeReference.frame}
        options={FRAMES}
        onChoose={(frame) => setReference({ frame })}
      />
      <Choice
        label="stamp is the"
        value={stamp}
        options={STAMPS}
        onChoose={(chosen) => onChange({ ...mapping, stamp: chosen })}
      />
      <label>
        exposure / min
        <input
          className="field"
          inputMode="decimal"
          placeholder="unknown"
          defaultValue={exposureDays === undefined ? '' : Number((exposureDays * MINUTES).toPrecision(6))}
          onChange={(event) => {
            const typed = Number(event.target.value);
            onChange({ ...mapping, exposureDays: typed > 0 ? typed / MINUTES : undefined });
          }}
        />
      </label>
      <label>
        passband
        <input
          className="field"
          value={passband}
          onChange={(event) => onChange({ ...mapping, passband: event.target.value || 'unknown' })}
        />
      </label>
      <p className="small quiet">
        0 for full Julian dates, 2400000.5 for MJD, empty where it is not known: {mapping.timeReason}.
      </p>
    </div>
  );
}

function Choice<T extends string>(props: {
  readonly label: string;
  readonly value: T;
  readonly options: readonly T[];
  readonly onChoose: (option: T) => void;
}) {
  const { label, value, options, onChoose } = props;
  return (
    <label>
      {label}
      <select className="field" value={value} onChange={(event) => onChoose(event.target.value as T)}>
        {options.map((option) => (
          <option key={option}>{option}</option>
        ))}
      </select>
    </label>
  );
}
