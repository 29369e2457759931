import 'fake-indexeddb/auto';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { createCandling } from '../../src/store/candling.ts';
import { createSessionStorage } from '../../src/store/session-storage.ts';
import { searchKey } from '../../src/store/target-keys.ts';
import type { WritingLock } from '../../src/store/writing-lock.ts';
import { createFakeJobs } from './fake-jobs.ts';

const freeLock: WritingLock = { take: async () => true, release: () => undefined };
const opened: { dispose(): void }[] = [];

function setUp(database = globalThis.crypto.randomUUID() as string, lock = freeLock) {
  const { jobs, searches, periods } = createFakeJobs();
  const candling = createCandling({
    jobs,
    storage: createSessionStorage(database),
    lock,
    app: '0.1.0',
    now: () => new Date(),
    newId: () => globalThis.crypto.randomUUID(),
  });
  opened.push(candling);
  return { candling, searches, periods, database };
}

afterEach(() => {
  for (const candling of opened.splice(0)) candling.dispose();
});

/** An invented star with a slow wave, so that recipes make a difference. */
const csv = (shift = 0) =>
  ['bjd_tdb,flux,flux_err']
    .concat(Array.from({ length: 200 }, (_, i) => `${2459000 + shift + i / 48},${1 + 1e-3 * Math.sin(i / 30)},0.0003`))
    .join('\n');
const file = (name: string, text: string) => ({
  name,
  bytes: async () => new Uint8Array(new TextEncoder().encode(text)).buffer,
});

async function openStar(set = setUp()) {
  await set.candling.startSession('test');
  await set.candling.files.add([file('star.csv', csv())]);
  await vi.waitFor(() => expect(set.searches).toHaveLength(1));
  return set;
}
const targetOf = ({ candling }: ReturnType<typeof setUp>) => candling.document.getState().document!.targets[0]!;

const periodOf = (periodDays: number, weight: number) => ({
  periodDays,
  periodErrorDays: 0.01,
  epochDays: 1,
  weight,
  deltaChiSquare: 0,
  eventsPredicted: 3,
  eventsWithData: 2,
});

describe('Candling without a screen', () => {
  it('reads, prepares and searches the target that is selected', async () => {
    const set = await openStar();
    expect(set.searches[0]!.key).toBe(searchKey(targetOf(set)));
    set.searches[0]!.finish();
    await vi.waitFor(() => expect(set.candling.actions.bench().search).toBeDefined());
    expect(set.candling.actions.bench().prepared!.time.length).toBeGreaterThan(190);
  });

  it('does not show a search as running because of its worker’s last words', async () => {
    const set = await openStar();
    set.searches[0]!.progress({ done: 1, total: 10 });
    expect(set.candling.actions.bench().running).toBeDefined();
    set.searches[0]!.finish();
    await vi.waitFor(() => expect(set.candling.actions.bench().search).toBeDefined());
    set.searches[0]!.progress({ done: 10, total: 10 });
    expect(set.candling.actions.bench().running).toBeUndefined();
  });

  it('drops the answer of a search whose recipe has changed', async () => {
    const set = await openStar();
    const target = targetOf(set);
    set.candling.document.getState().run({
      kind: 'set recipe',
      targetId: target.id,
      recipe: { ...target.recipe, detrend: { kind: 'none' } },
    });
    await vi.waitFor(() => expect(set.searches).toHaveLength(2));
    expect(set.searches[0]!.cancelled).toBe(true);
    set.searches[0]!.finish();
    await Promise.resolve();
    expect(set.candling.actions.bench().search).toBeUndefined();
    set.searches[1]!.finish();
    await vi.waitFor(() => expect(set.candling.actions.bench().search?.key).toBe(searchKey(targetOf(set))));
  });

  it('does not start a search again that the analyst cancelled, until asked', async () => {
    const set = await openStar();
    set.searches[0]!.progress({ done: 1, total: 10 });
    set.candling.actions.bench().running!.cancel();
    await vi.waitFor(() => expect(set.candling.actions.bench().running).toBeUndefined());
    set.candling.view.setState({ targetId: undefined });
    set.candling.actions.selectTarget(targetOf(set).id);
    await new Promise((resolve) => setTimeout(resolve, 20));
    expect(set.searches).toHaveLength(1);
    set.candling.targetResults.searchAgain(targetOf(set));
    await vi.waitFor(() => expect(set.searches).toHaveLength(2));
  });

  it('comes back with document, files and view', async () => {
    const set = await openStar();
    const { actions, document, view } = set.candling;
    actions.setEphemeris({ periodDays: 1.5, epochDays: 1, durationDays: 0.1 });
    actions.makeCaseFromTrial();
    view.setState({ fluxView: 'raw' });
    await vi.waitFor(() => expect(document.getState().saveState?.kind).toBe('saved'));
    await vi.waitFor(async () =>
      expect((await set.candling.storage.readView(document.getState().document!.id))?.fluxView).toBe('raw'),
    );
    const before = document.getState().history!.present;
    set.candling.dispose();

    const again = setUp(set.database);
    expect(await again.candling.reopenLast()).toBe(true);
    expect(again.candling.document.getState().document).toEqual(before);
    expect(again.candling.view.getState()).toMatchObject({ fluxView: 'raw', caseId: before.targets[0]!.cases[0]!.id });
    await vi.waitFor(() => expect(again.candling.actions.bench().prepared).toBeDefined());
  });

  it('never saves a drag that was not let go', async () => {
    const set = await openStar();
    const { actions, document, storage } = set.candling;
    actions.setEphemeris({ periodDays: 1.5, epochDays: 1, durationDays: 0.1 });
    actions.makeCaseFromTrial();
    actions.setEphemeris({ periodDays: 1.7, epochDays: 1, durationDays: 0.1 }, 'preview');
    expect(document.getState().document!.targets[0]!.cases[0]!.timing).toMatchObject({ periodDays: 1.7 });
    await vi.waitFor(() => expect(document.getState().saveState?.kind).toBe('saved'));
    expect((await storage.lastSession())!.document.targets[0]!.cases[0]!.timing).toMatchObject({ periodDays: 1.5 });
  });

  it('changes nothing while another tab writes, and says so', async () => {
    const set = setUp(undefined, { take: async () => false, release: () => undefined });
    await set.candling.startSession('test');
    const { run } = set.candling.document.getState();
    expect(run({ kind: 'name session', name: 'other' })).toBe(false);
    expect(set.candling.document.getState().refusal).toContain('another tab');
    expect(set.candling.document.getState().document!.name).toBe('test');
  });

  it('says of a file why it was not read, and reads the others', async () => {
    const set = setUp();
    await set.candling.startSession('test');
    const broken = { name: 'gone.csv', bytes: () => Promise.reject(new Error('no permission')) };
    await set.candling.files.add([file('word.csv', 'a\nb'), broken, file('star.csv', csv())]);
    expect(set.candling.document.getState().document!.targets.map(({ label }) => label)).toEqual(['star']);
    const unread = set.candling.view.getState().unread.map(({ sentence }) => sentence);
    expect(unread[0]).toContain('word.csv was not read.');
    expect(unread[1]).toContain('gone.csv was not read. The browser said: no permission.');
  });

  it('names the file that an imported session misses, and shows its flux once it is opened', async () => {
    const set = await openStar();
    const { present } = set.candling.document.getState().history!;
    const other = setUp();
    await other.candling.openSession(present);
    await vi.waitFor(() => expect(other.candling.actions.bench().failure).toContain('star.csv is not on this machine'));
    await other.candling.files.add([file('star.csv', csv())]);
    expect(other.candling.document.getState().document!.targets).toHaveLength(1);
    await vi.waitFor(() => expect(other.candling.actions.bench().prepared).toBeDefined());
    expect(other.candling.actions.bench().failure).toBeUndefined();
  });

  it('makes a single event of one marked dip and a period of several', async () => {
    const set = await openStar();
    const { actions } = set.candling;
    await vi.waitFor(() => expect(actions.bench().prepared).toBeDefined());
    await actions.makeCaseFromMarks();
    expect(set.candling.view.getState().notice?.sentence).toContain('Mark one or more dips first');
    actions.saveMark({ start: 0.9, end: 1.1 }, { kind: 'dip', note: '' });
    await actions.makeCaseFromMarks();
    expect(actions.bench().case!.timing).toMatchObject({ kind: 'single', timeDays: 1 });
    actions.saveMark({ start: 2.1, end: 2.3 }, { kind: 'dip', note: '' });
    await actions.makeCaseFromMarks();
    expect(set.candling.view.getState().notice?.sentence).toContain('No period fits');
    set.periods.push(periodOf(1.2, 0.7));
    await actions.makeCaseFromMarks();
    expect(actions.bench().case!.timing).toMatchObject({ kind: 'linear', periodDays: 1.2, epochDays: 1 });
    expect(actions.bench().case!.numbers?.key).toBeDefined();
  });

  it('makes an alias set where more than one period fits, and one period of it when asked', async () => {
    const set = await openStar();
    const { actions } = set.candling;
    await vi.waitFor(() => expect(actions.bench().prepared).toBeDefined());
    for (const start of [0.9, 2.1]) actions.saveMark({ start, end: start + 0.2 }, { kind: 'dip', note: '' });
    set.periods.push(periodOf(1.2, 0.7), periodOf(0.6, 0.3));
    await actions.makeCaseFromMarks();
    const { timing } = actions.bench().case!;
    expect(timing).toMatchObject({ kind: 'alias set', periods: [{ periodDays: 1.2 }, { periodDays: 0.6 }] });
    expect(actions.bench().ephemeris!.periodDays).toBe(1.2);
    actions.showAlias(0.6);
    expect(actions.bench().ephemeris!.periodDays).toBe(0.6);
    actions.nudge('epoch', 1);
    expect(actions.bench().case!.timing.kind).toBe('alias set');
    actions.keepAlias(0.6);
    expect(actions.bench().case!.timing).toMatchObject({ kind: 'linear', periodDays: 0.6 });
    set.candling.document.getState().undo();
    expect(actions.bench().case!.timing.kind).toBe('alias set');
  });

  it('searches the whole docket once, and not again what has been searched', async () => {
    const set = setUp();
    await set.candling.startSession('test');
    await set.candling.files.add([file('one.csv', csv()), file('two.csv', csv(5)), file('three.csv', csv(9))]);
    const finishing = setInterval(() => {
      for (const search of set.searches) search.finish();
    }, 5);
    await vi.waitFor(() => expect(set.candling.results.getState().summaries.size).toBeGreaterThan(0));
    await set.candling.sweep.start();
    clearInterval(finishing);
    expect(set.candling.results.getState().summaries.size).toBe(3);
    expect(set.searches).toHaveLength(3);
    await set.candling.sweep.start();
    expect(set.searches).toHaveLength(3);
  });
});
