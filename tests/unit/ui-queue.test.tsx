import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, expect, test, vi } from 'vitest';
import { GivenUpFiles } from '@/components/admin/given-up-files';
import { QueueFacts } from '@/components/admin/queue-facts';
import type { QueueState, TroubledFile } from '@/lib/rules/queue-state';

const refresh = vi.fn();
vi.mock('next/navigation', () => ({ useRouter: () => ({ refresh }) }));
beforeEach(() => refresh.mockClear());

const trouble = (given: Partial<TroubledFile> = {}): TroubledFile => ({
  file: 'props/bell_v003.obj',
  show: 'tarn',
  import: 'b0b0b0b0-0000-4000-8000-000000000000',
  reason: 'This file was begun 8 times and never came to an end. A disk is full.',
  again_at: null,
  at: '2026-11-03T10:00:00.000Z',
  faults: [{ at: '2026-11-03T09:00:00.000Z', attempt: 1, worker: 'north-1', message: 'A disk is full.' }],
  ...given,
});

const idle: QueueState = { waiting_files: 0, oldest_waiting_s: null, workers: [], shows: [], put_off: [], given_up: [] };

test('without a worker the page says that files wait until one is started', () => {
  render(<QueueFacts {...idle} />);
  expect(screen.getByText(/No worker is running/)).toBeTruthy();
  expect(screen.getByText('Nothing waits.')).toBeTruthy();
});

test('each worker stands with what it has in hand and since when; a silent one is told apart', () => {
  const worker = { threads: 2, memory_bytes: 8e9, started_at: '2026-11-03T08:00:00.000Z' };
  const file = { file: 'ox_v012.obj', show: 'tarn', import: 'b0b0b0b0-0000-4000-8000-000000000000', state: 'measuring' as const, attempt: 2, since: '2026-11-03T09:59:00.000Z' };
  render(<QueueFacts {...idle} waiting_files={41} oldest_waiting_s={12} shows={[{ show: 'tarn', files: 41, paused_files: 3, since: '2026-11-03T09:00:00.000Z' }]} workers={[{ ...worker, name: 'north-1', alive: true, files: [file] }, { ...worker, name: 'south-1', alive: false, files: [] }]} />);
  const [, north, south] = within(screen.getByRole('table', { name: 'Workers' })).getAllByRole('row');
  expect(within(north).getByRole('link', { name: 'ox_v012.obj' }).getAttribute('href')).toBe('/shows/tarn/imports/b0b0b0b0-0000-4000-8000-000000000000');
  expect(north.textContent).toMatch(/since .*, try 2/);
  expect(south.textContent).toContain('south-1 (silent)');
  expect(screen.queryByText(/No worker is running/)).toBeNull();
  expect(screen.getByText(/41 files, the first of them for 12 s/)).toBeTruthy();
});

test('a file that was given up says why and what was tried, and is tried again alone', async () => {
  const retry = vi.fn().mockResolvedValue({ ok: true, data: null });
  render(<GivenUpFiles files={[trouble(), trouble({ file: 'props/oar_v001.obj' })]} retry={retry} />);
  expect(screen.getAllByText(/A disk is full\.$/, { selector: 'p' })).toHaveLength(2);
  expect(screen.getAllByText(/north-1: A disk is full\./)).toHaveLength(2);
  await userEvent.click(screen.getByRole('button', { name: 'Try props/oar_v001.obj again' }));
  expect(retry).toHaveBeenCalledWith({ show: 'tarn', import: 'b0b0b0b0-0000-4000-8000-000000000000', files: ['props/oar_v001.obj'] });
  expect(refresh).toHaveBeenCalledOnce();
});
