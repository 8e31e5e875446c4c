import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { NuqsTestingAdapter } from 'nuqs/adapters/testing';
import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { ApprovalsQueue } from '@/components/approvals/approvals-queue';
import { Toaster } from '@/components/ui/toaster';
import { TooltipProvider } from '@/components/ui/tooltip';
import { makeQueryClient } from '@/hooks/make-query-client';
import type { ActionResult } from '@/lib/rules/action-result';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import type { QueueRow } from '@/lib/rules/approval-queue';
import { makePartRow } from '../support/make-part-row';
import { makeQueuePage, makeQueueRow } from '../support/make-queue-row';

vi.setConfig({ testTimeout: 60_000 });
const push = vi.fn();
vi.mock('next/navigation', () => ({ useRouter: () => ({ push }) }));

const frame = { code: 'tarn', title: 'Tarn', linear_unit: 'cm', up_axis: 'y', may_set: true, may_ask: true, may_approve: true, may_import: true } as const;
const PATIENCE = { timeout: 20_000 };

const sha = (letter: string) => letter.repeat(64);
const last = { value_id: '00000000-0000-4000-8000-00000000000a', version: 'v011', approved_by: 'Tamsel Wroe', approved_at: '2026-11-20T09:00:00.000Z', note: null, mass_kg: 1.8, com_m: [0.5, 0.5, 1] as const };
const request = { asked_by: 'Ilvo Brackmere', asked_at: '2026-11-29T09:00:00.000Z', note: 'for the lake shots', own: false, changed: false };
const warning = { code: 'cap_large', severity: 'warning', message: 'A cap is large.', count: 1 } as const;

/** What the pretended server holds, and what it was sent. */
let rows: QueueRow[];
let sent: { act: string; input: Record<string, unknown> }[];
let refuse: ActionResult<unknown> | null;

const taking = (act: string) => (input: Record<string, unknown>) => {
  sent.push({ act, input });
  if (refuse !== null) return Promise.resolve(refuse);
  const items = input.items as { part?: string; value_id?: string }[];
  rows = rows.map((row) => (act === 'approve' && items.some((item) => item.part === row.part) ? { ...row, state: 'approved' as const, value_id: last.value_id } : row));
  return Promise.resolve({ ok: true as const, data: {} });
};
const actions = { approve: taking('approve'), withdraw: taking('withdraw'), ask: taking('ask') } as unknown as ApprovalActions;

function serve(path: string): Response {
  const state = new URL(path, 'http://127.0.0.1').searchParams.get('state');
  const shown = rows.filter((row) => (state === 'approved' ? row.value_id !== null : row.value_id === null && (state !== 'asked' || row.request !== null) && (state !== 'outdated' || row.state === 'outdated')));
  return new Response(JSON.stringify({ ...makeQueuePage(rows), items: shown }), { status: 200, headers: { 'content-type': 'application/json' } });
}

beforeAll(() => {
  // jsdom lays nothing out: the grid is given a size, so that rows come into sight.
  for (const [property, value] of [['clientHeight', 800], ['clientWidth', 1600], ['offsetHeight', 800], ['offsetWidth', 1600]] as const) {
    Object.defineProperty(HTMLElement.prototype, property, { configurable: true, get: () => value });
  }
  globalThis.ResizeObserver ??= class {
    observe() {}
    unobserve() {}
    disconnect() {}
  };
  Element.prototype.scrollIntoView = () => undefined;
});

beforeEach(() => {
  sent = [];
  refuse = null;
  push.mockClear();
  rows = [
    makeQueueRow({ part: 'head', value_sha256: sha('a'), request }),
    makeQueueRow({ part: 'torso', value_sha256: sha('b'), state: 'outdated', last, verdict: '+9 %, 31 mm along +z', beyond_tolerance: true, locked_shots: ['fer_0010', 'fer_0020', 'fer_0030'] }),
    makeQueueRow({ part: 'tail', value_sha256: sha('c'), warnings: [warning] }),
    makeQueueRow({ part: 'hoof', value_sha256: sha('d'), own: true, setters: ['Tamsel Wroe'] }),
    makeQueueRow({ asset: 'bell', category: 'prop', part: 'shell', value_sha256: sha('e') }),
  ];
  vi.stubGlobal('fetch', vi.fn((path: string) => Promise.resolve(serve(path))));
});

function show({ search = '', mayApprove = true } = {}) {
  return render(
    <NuqsTestingAdapter searchParams={search} hasMemory>
      <QueryClientProvider client={makeQueryClient()}>
        <TooltipProvider>
          <ApprovalsQueue frame={{ ...frame, may_approve: mayApprove }} actions={actions} />
        </TooltipProvider>
        <Toaster />
      </QueryClientProvider>
    </NuqsTestingAdapter>,
  );
}

/** The row of a key. Sought by its key and not by its role: computing every row's name takes seconds on a busy machine. */
function row(key: string): Promise<HTMLElement> {
  return waitFor(() => {
    const found = document.querySelector<HTMLElement>(`[data-key="${key}"]`);
    if (found === null) throw new Error(`No row ${key} yet.`);
    return found;
  }, PATIENCE);
}

const grid = () => document.querySelector<HTMLElement>('[role=treegrid]')!;
const activeKey = () => document.getElementById(grid().getAttribute('aria-activedescendant') ?? '')?.dataset.key;
const partsOf = (index: number) => (sent[index].input.items as { part: string }[]).map((item) => item.part);

/** The queue with the keyboard in it. */
async function opened(options: Parameters<typeof show>[0] = {}) {
  const user = userEvent.setup({ delay: null });
  show(options);
  await waitFor(() => expect(grid()).toBeInTheDocument(), PATIENCE);
  grid().focus();
  return user;
}

describe('the approvals queue', () => {
  it('groups by asset, says the verdict with its locked shots, who asks with which words, and who may not', async () => {
    await opened();
    expect(within(await row('ox/torso')).getByText('+9 %, 31 mm along +z; 3 locked shots')).toBeInTheDocument();
    expect(within(await row('ox/torso')).getByText('beyond tolerance')).toBeInTheDocument();
    expect(within(await row('ox/head')).getByText('“for the lake shots”')).toBeInTheDocument();
    expect(within(await row('ox/head')).getByText('asked by Ilvo Brackmere, set by Mara Quill')).toBeInTheDocument();
    expect(within(await row('ox/hoof')).getByText(/somebody else approves it/)).toBeInTheDocument();
    expect([...document.querySelectorAll<HTMLElement>('[data-key]')].map((one) => one.dataset.key)).toEqual(['ox/', 'ox/head', 'ox/torso', 'ox/tail', 'ox/hoof', 'bell/', 'bell/shell']);
    expect(activeKey()).toBe('ox/head');
  });

  it('moves by j, k and the arrows', async () => {
    const user = await opened();
    await user.keyboard('jj');
    expect(activeKey()).toBe('ox/tail');
    await user.keyboard('k{ArrowDown}{ArrowDown}');
    expect(activeKey()).toBe('ox/hoof');
  });

  it('approves the very value that was seen, moves on to the next and says so', async () => {
    const user = await opened();
    await user.keyboard('a');
    await waitFor(() => expect(activeKey()).toBe('ox/torso'), PATIENCE);
    expect(sent).toEqual([{ act: 'approve', input: { show: 'tarn', items: [{ asset: 'ox', part: 'head', value_sha256: sha('a') }], note: '' } }]);
    expect(document.querySelector('[data-key="ox/head"]')).toBeNull();
    expect(await screen.findByText('Approved ox head', undefined, PATIENCE)).toBeInTheDocument();
    expect(screen.queryByText('Undo')).not.toBeInTheDocument();
    expect(screen.getByRole('button', { name: /Waiting/ })).toHaveTextContent('4');
  });

  it('approves what is chosen with a note, in one call', async () => {
    const user = await opened();
    await user.keyboard('xjxn');
    await user.type(await screen.findByLabelText('Note', undefined, PATIENCE), 'as weighed');
    await user.click(within(screen.getByRole('dialog')).getByText('Approve'));
    await waitFor(() => expect(sent).toHaveLength(1), PATIENCE);
    expect(sent[0].input).toMatchObject({ note: 'as weighed' });
    expect(partsOf(0)).toEqual(['head', 'torso']);
    await waitFor(() => expect(activeKey()).toBe('ox/tail'), PATIENCE);
  });

  it('approves an asset’s values without warnings and without the reader’s own, by Shift and A', async () => {
    const user = await opened();
    await user.keyboard('{Shift>}A{/Shift}');
    await waitFor(() => expect(sent).toHaveLength(1), PATIENCE);
    expect(partsOf(0)).toEqual(['head', 'torso']);
    expect(screen.queryByText('Approve 2')).not.toBeInTheDocument();
  });

  it('leaves the reader’s own values alone and says why', async () => {
    const user = await opened();
    await user.keyboard('jjja');
    expect(sent).toEqual([]);
    expect((await screen.findAllByText(/somebody else approves it/, undefined, PATIENCE)).length).toBeGreaterThan(1);
  });

  it('shows a refusal at its row with the value as it is, and loses nothing', async () => {
    const user = await opened();
    const current = makePartRow({ part: 'head', mass_kg: 7, set_by: 'Odo Vane' });
    refuse = { ok: false, code: 'conflict', message: 'ox/head is another value by now. Nothing was approved.', field: 'items.0', errors: [{ index: 0, code: 'changed_meanwhile', message: 'ox/head is another value by now.', current }] };
    await user.keyboard('xn');
    await user.type(await screen.findByLabelText('Note', undefined, PATIENCE), 'long words');
    await user.click(within(screen.getByRole('dialog')).getByText('Approve'));
    expect(await within(screen.getByRole('dialog')).findByText(/Nothing was approved/, undefined, PATIENCE)).toBeInTheDocument();
    expect(screen.getByLabelText('Note')).toHaveValue('long words');
    expect(within(await row('ox/head')).getByText('ox/head is another value by now. Now 7.000 kg, set by Odo Vane.')).toBeInTheDocument();
    expect(await row('ox/head')).toHaveAttribute('aria-selected', 'true');
  });

  it('compares by c, opens by Enter, and lists its keys by ?', async () => {
    const user = await opened();
    await user.keyboard('jc');
    expect(push).toHaveBeenLastCalledWith('/shows/tarn/compare?asset=ox&part=torso');
    await user.keyboard('{Enter}');
    expect(push).toHaveBeenLastCalledWith('/shows/tarn/assets/ox/torso');
    await user.keyboard('?');
    expect(await screen.findByText('Keys of the approvals queue', undefined, PATIENCE)).toBeInTheDocument();
  });

  it('takes an approval back with a reason only', async () => {
    rows = rows.map((one) => (one.part === 'torso' ? { ...one, state: 'approved', value_id: last.value_id, verdict: 'as approved' } : one));
    const user = await opened({ search: '?state=approved' });
    await row('ox/torso');
    await user.keyboard('t');
    const dialog = await screen.findByRole('dialog', undefined, PATIENCE);
    expect(within(dialog).getByText(/fer_0010, fer_0020, fer_0030/)).toBeInTheDocument();
    await user.click(within(dialog).getByText('Take back'));
    expect(within(dialog).getByText('Say why.')).toBeInTheDocument();
    expect(sent).toEqual([]);
    await user.type(within(dialog).getByLabelText('Reason'), 'wrong ox');
    await user.click(within(dialog).getByText('Take back'));
    await waitFor(() => expect(sent).toEqual([{ act: 'withdraw', input: { show: 'tarn', items: [{ value_id: last.value_id }], reason: 'wrong ox' } }]), PATIENCE);
  });

  it('lets a TD ask and not approve', async () => {
    const user = await opened({ mayApprove: false });
    await user.keyboard('ja');
    expect(sent).toEqual([]);
    await user.keyboard('q');
    await user.type(await screen.findByLabelText('Note', undefined, PATIENCE), 'please');
    await user.click(within(screen.getByRole('dialog')).getByText('Ask'));
    await waitFor(() => expect(sent).toHaveLength(1), PATIENCE);
    expect(sent[0]).toMatchObject({ act: 'ask', input: { note: 'please', items: [{ asset: 'ox', part: 'torso' }] } });
  });
});
