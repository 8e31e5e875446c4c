import { act, render, screen, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { FileDetail } from '@/components/imports/file-detail';
import { ImportAnnouncer } from '@/components/imports/import-announcer';
import { ImportProgress } from '@/components/imports/import-progress';
import type { ImportCounts, ImportFileRow, ImportSummary } from '@/lib/rules/import-answer';
import { MENDS } from '@/lib/rules/import-mends';

const counts = (changes: Partial<ImportCounts>): ImportCounts => ({ queued: 0, reading: 0, measuring: 0, done: 0, failed: 0, total: 0, ...changes });

function summary(changes: Partial<ImportSummary>): ImportSummary {
  return {
    id: 'i', state: 'running', paused: false, scheme: 'catmull-clark', boundary: 'edge-and-corner', parts_by: 'group', weld: false, turn_faces: false, created_by: 'Odrun Vask',
    created_at: '2026-01-05T10:00:00Z', submitted_at: null, ended_at: null, counts: counts({}), seconds_left: null, mark: '1', ...changes,
  } as ImportSummary;
}

function file(changes: Partial<ImportFileRow>): ImportFileRow {
  return { name: 'ox_v001.obj', state: 'done', asset: 'ox', version: 'v001', parts: 2, problems: 0, remarks: [], size_m: [1, 2, 3], sha256: '0'.repeat(64), bytes: 10, error: null, planned: null, warnings: 0, findings: [], ...changes };
}

describe('the stages', () => {
  test('each have their count, and the whole is a progress bar', () => {
    render(<ImportProgress summary={summary({ counts: counts({ queued: 120, reading: 2, measuring: 3, done: 70, failed: 5, total: 200 }), seconds_left: 240 })} />);
    const bar = screen.getByRole('progressbar', { name: 'Files that have ended' });
    expect(bar.getAttribute('aria-valuenow')).toBe('75');
    expect(bar.getAttribute('aria-valuemax')).toBe('200');
    const terms = screen.getAllByRole('term').map((term) => `${term.textContent} ${term.nextElementSibling?.textContent}`);
    expect(terms).toEqual(['Uploaded 200', 'Waiting 120', 'Reading 2', 'Measuring 3', 'Done 70', 'Failed 5']);
    expect(screen.getByText(/about 4 min left/)).toBeTruthy();
  });

  test('say no time while it is not known, or while the import is paused', () => {
    const { rerender } = render(<ImportProgress summary={summary({ seconds_left: null })} />);
    expect(screen.queryByText(/left/)).toBeNull();
    rerender(<ImportProgress summary={summary({ seconds_left: 240, paused: true })} />);
    expect(screen.queryByText(/left/)).toBeNull();
    expect(screen.getByText('paused')).toBeTruthy();
  });
});

describe('a file', () => {
  test('that failed shows its line with the caret, and what mends it', () => {
    const error = { code: 'vertex_out_of_range', message: 'Expected a vertex number.', line: 10, column: 11, excerpt: 'f 1 3 4 2 99\n          ^' };
    render(<FileDetail show="quay" file={file({ state: 'failed', asset: null, error })} />);
    expect(screen.getByText('line 10, column 11')).toBeTruthy();
    expect(screen.getByLabelText('The line of the file').textContent).toBe(error.excerpt);
    expect(screen.getByText(MENDS.content.act)).toBeTruthy();
  });

  test('with problems leads to the finding on the page of each part', () => {
    const finding = (part: string | null) => ({ code: 'open_border', severity: 'problem' as const, message: '4 edges have one face only.', part, count: 4, line: 12 });
    render(<FileDetail show="quay" file={file({ problems: 12, findings: [finding('left/horn'), finding(null)] })} />);
    const [ofPart, ofFile, rest] = screen.getAllByRole('listitem');
    expect(within(ofPart).getByRole('link', { name: 'left/horn' }).getAttribute('href')).toBe('/shows/quay/assets/ox/left%2Fhorn#finding-open_border');
    expect(ofPart.textContent).toContain('line 12');
    expect(within(ofFile).getByRole('link', { name: 'ox' }).getAttribute('href')).toBe('/shows/quay/assets/ox');
    expect(rest.textContent).toBe('10 more, all in the report.');
  });
});

describe('a screen reader', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());
  const said = () => screen.getByRole('status').textContent;

  test('is told of failures now and then and of the end, not of every file', () => {
    const { rerender } = render(<ImportAnnouncer summary={summary({ counts: counts({ queued: 100, total: 100 }) })} />);
    const heard = new Set([said()]);
    for (let done = 1; done <= 20; done++) {
      rerender(<ImportAnnouncer summary={summary({ counts: counts({ queued: 100 - done, done, total: 100 }) })} />);
      heard.add(said());
    }
    expect([...heard]).toEqual(['']);
    rerender(<ImportAnnouncer summary={summary({ counts: counts({ queued: 78, done: 20, failed: 2, total: 100 }) })} />);
    act(() => void vi.advanceTimersByTime(60_000));
    expect(said()).toBe('2 files failed so far.');
    // Failures that keep coming put off what is said of them only for a while.
    for (let failed = 3; failed < 30; failed++) {
      rerender(<ImportAnnouncer summary={summary({ counts: counts({ queued: 80 - failed, done: 20, failed, total: 100 }) })} />);
      act(() => void vi.advanceTimersByTime(1_000));
    }
    expect(Number(/^\d+/.exec(said()!)![0])).toBeGreaterThan(10);
    rerender(<ImportAnnouncer summary={summary({ state: 'done', counts: counts({ done: 97, failed: 3, total: 100 }) })} />);
    expect(said()).toBe('The import is done. 97 files measured, 3 failed.');
  });
});
