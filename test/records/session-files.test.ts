import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { fileStem } from '../../src/records/save-file.ts';
import { entriesAhead, importSession, missingWords } from '../../src/records/session-files.ts';
import { writeSession } from '../../src/session/write-session.ts';
import type { Candling } from '../../src/store/candling.ts';
import { openCandling, openStars, timing } from '../cases/open-case.ts';

let candling: Candling;
const opened: Candling[] = [];
const open = () => {
  const fresh = openCandling();
  opened.push(fresh);
  return fresh;
};
const document = (of = candling) => of.document.getState().document!;
const file = (name: string, text: string) => ({ name, text: async () => text });
const notice = (of = candling) => of.view.getState().notice;

beforeEach(async () => {
  candling = open();
  await openStars(candling, ['a.csv', 'b.csv']);
});
afterEach(() => {
  for (const one of opened.splice(0)) one.dispose();
});

describe('importing a session', () => {
  it('opens it where its files are, and says nothing', async () => {
    await importSession(candling, file('s.candling.json', writeSession(document())));
    expect(notice()).toBeUndefined();
    expect(document().targets).toHaveLength(2);
  });

  it('names the files that are not on this machine', async () => {
    const elsewhere = open();
    await importSession(elsewhere, file('s.candling.json', writeSession(document())));
    expect(document(elsewhere)).toEqual(document());
    expect(notice(elsewhere)?.sentence).toBe(missingWords(['a.csv', 'b.csv']));
  });

  it('refuses what is no session, or cannot be read, and changes nothing', async () => {
    const before = document();
    await importSession(candling, file('torn.candling.json', '{"format":'));
    expect(notice()).toMatchObject({ kind: 'error', sentence: expect.stringContaining('torn.candling.json') });
    await importSession(candling, { name: 'gone.json', text: () => Promise.reject(new Error('it was moved')) });
    expect(notice()).toMatchObject({ kind: 'error', sentence: expect.stringContaining('it was moved') });
    expect(document()).toBe(before);
  });

  it('refuses an earlier state of the open session, which would undo decisions', async () => {
    const earlier = writeSession(document());
    candling.actions.makeCaseByHand(timing);
    const before = document();
    await importSession(candling, file('earlier.candling.json', earlier));
    expect(document()).toBe(before);
    expect(notice()?.sentence).toMatch(/earlier state of the open session and lacks 1 journal entry/);
    await candling.startSession('another');
    await importSession(candling, file('earlier.candling.json', earlier));
    expect(document().targets[0]!.cases).toEqual([]);
    expect(document().id).not.toBe(before.id);
    expect(document().name).toContain('(earlier state)');
    expect((await candling.storage.readSession(before.id))!.document.targets[0]!.cases).toHaveLength(1);
  });

  it('opens a later state of the open session', async () => {
    const elsewhere = open();
    await importSession(elsewhere, file('s.candling.json', writeSession(document())));
    candling.actions.makeCaseByHand(timing);
    await importSession(elsewhere, file('later.candling.json', writeSession(document())));
    expect(document(elsewhere).targets[0]!.cases).toHaveLength(1);
  });

  it('counts what only the open one has, of the same session alone', () => {
    const earlier = document();
    candling.actions.makeCaseByHand(timing);
    const later = document();
    expect([entriesAhead(later, earlier), entriesAhead(earlier, later)]).toEqual([1, 0]);
    expect(entriesAhead(later, { ...earlier, id: 'other' })).toBe(0);
  });
});

describe('words and names', () => {
  it('names five missing files and counts the rest', () => {
    expect(missingWords(['a.csv'])).toMatch(/^1 file of this session is not on this machine \(a\.csv\)\./);
    expect(missingWords(['a', 'b', 'c', 'd', 'e', 'f', 'g'])).toMatch(/^7 files .* \(a, b, c, d, e and 2 more\)\./);
  });

  it('makes file names that every file system takes', () => {
    expect(fileStem('Ridge 2: a/b\\c?')).toBe('Ridge-2-a-b-c');
    expect(fileStem('../..')).toBe('session');
    expect(fileStem('   ')).toBe('session');
    expect(fileStem('x'.repeat(300))).toHaveLength(80);
  });
});
