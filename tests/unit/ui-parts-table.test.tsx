import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { NuqsTestingAdapter } from 'nuqs/adapters/testing';
import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { PartsTable } from '@/components/parts/parts-table';
import { Toaster } from '@/components/ui/toaster';
import { TooltipProvider } from '@/components/ui/tooltip';
import { makeQueryClient } from '@/hooks/make-query-client';
import type { PartRow } from '@/lib/rules/part-row';
import { makePartPage, makePartRow } from '../support/make-part-row';

vi.setConfig({ testTimeout: 60_000 });
vi.mock('next/navigation', () => ({ useRouter: () => ({ push: vi.fn() }) }));

const ask = vi.fn(() => Promise.resolve({ ok: true as const, data: {} }));
const actions = { approve: vi.fn(), withdraw: vi.fn(), ask };

const frame = {
  code: 'tarn',
  title: 'Tarn',
  linear_unit: 'cm',
  up_axis: 'y',
  may_set: true,
  may_ask: true,
  may_approve: false,
  may_import: true,
} as const;

/** What the pretended server holds, and the PATCH bodies that it took. */
let rows: PartRow[];
let taken: { items: Record<string, unknown>[] }[];

function answer(body: unknown, status = 200): Response {
  return new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/json' } });
}

function serve(path: string, init: RequestInit = {}): Response {
  if (path.includes('/materials')) return answer({ items: [], next_cursor: null });
  if (init.method !== 'PATCH') return answer(makePartPage(path.includes('changed_since') ? [] : rows));
  const body = JSON.parse(String(init.body)) as { items: { part: string; revision: number }[] };
  const stale = body.items.flatMap((item, index) => {
    const current = rows.find((row) => row.part === item.part)!;
    return current.revision === item.revision
      ? []
      : [{ index, code: 'changed_meanwhile', message: 'It changed.', current }];
  });
  if (stale.length > 0)
    return answer({ status: 409, code: 'conflict', detail: 'Rows changed meanwhile.', errors: stale }, 409);
  taken.push(body as unknown as (typeof taken)[number]);
  rows = rows.map((row) =>
    body.items.some((item) => item.part === row.part) ? { ...row, revision: row.revision + 1 } : row,
  );
  const page = makePartPage(rows);
  return answer({
    items: rows.filter((row) => body.items.some((item) => item.part === row.part)),
    assets: page.assets,
    counts: page.counts,
  });
}

beforeAll(() => {
  // jsdom lays nothing out: the grid is given a size, so that rows come into sight.
  for (const [property, value] of [
    ['clientHeight', 600],
    ['clientWidth', 1600],
    ['offsetHeight', 600],
    ['offsetWidth', 1600],
  ] as const) {
    Object.defineProperty(HTMLElement.prototype, property, { configurable: true, get: () => value });
  }
  globalThis.ResizeObserver ??= class {
    observe() {}
    unobserve() {}
    disconnect() {}
  };
  Element.prototype.scrollTo = () => undefined;
  Element.prototype.hasPointerCapture = () => false;
  Element.prototype.setPointerCapture = () => undefined;
  Element.prototype.scrollIntoView = () => undefined;
});

beforeEach(() => {
  taken = [];
  rows = [
    makePartRow({ part: 'head', mass_source: 'target_mass', target_mass_kg: 2 }),
    makePartRow({ part: 'horn_L' }),
    makePartRow({ part: 'horn_R' }),
    makePartRow({ asset: 'bell', part: 'shell', category: 'prop', state: 'unset', mass_kg: null, mass_source: null }),
  ];
  vi.stubGlobal(
    'fetch',
    vi.fn((path: string, init?: RequestInit) => Promise.resolve(serve(path, init))),
  );
});

function show(search = '') {
  return render(
    <NuqsTestingAdapter searchParams={search} hasMemory>
      <QueryClientProvider client={makeQueryClient()}>
        <TooltipProvider>
          <PartsTable frame={frame} actions={actions} />
        </TooltipProvider>
        <Toaster />
      </QueryClientProvider>
    </NuqsTestingAdapter>,
  );
}

/** The row of a key. Sought by its key and not by its role: computing every row's name takes seconds on a busy machine. */
function row(key: string): Promise<HTMLElement> {
  return waitFor(
    () => {
      const found = document.querySelector<HTMLElement>(`[data-key="${key}"]`);
      if (found === null) throw new Error(`No row ${key} yet.`);
      return found;
    },
    { timeout: 20_000 },
  );
}

describe('PartsTable', () => {
  it('groups parts by asset and says how many there are', async () => {
    show();
    await row('ox/head');
    expect([...document.querySelectorAll<HTMLElement>('[role=row][data-key]')].map((one) => one.dataset.key)).toEqual([
      'ox/',
      'ox/head',
      'ox/horn_L',
      'ox/horn_R',
      'bell/',
      'bell/shell',
    ]);
    expect(document.querySelector('[role=treegrid]')).toHaveAttribute('aria-rowcount', '7');
    expect(screen.getByText(/4 parts in 2 assets/)).toBeInTheDocument();
  });

  it('reads its filters from the address', async () => {
    show('?state=unset');
    await row('bell/shell');
    expect(screen.queryByText('head')).not.toBeInTheDocument();
  });

  it('sets what is typed on all chosen rows in one call that carries their revisions', async () => {
    const user = userEvent.setup({ delay: null });
    show();
    await user.click(await row('ox/horn_L'));
    await user.keyboard('{Shift>}{ArrowDown}{/Shift}85 g');
    expect(screen.getByText(/each of 2 parts/)).toBeInTheDocument();
    await user.keyboard('{Enter}');
    await waitFor(() => expect(taken).toHaveLength(1), { timeout: 20_000 });
    expect(taken[0].items).toEqual([
      { asset: 'ox', part: 'horn_L', revision: 1, target_mass_kg: 0.085 },
      { asset: 'ox', part: 'horn_R', revision: 1, target_mass_kg: 0.085 },
    ]);
  });

  it('takes an act back with the revision that the act made', async () => {
    const user = userEvent.setup({ delay: null });
    show();
    await user.click(await row('ox/head'));
    await user.keyboard('5{Enter}');
    await waitFor(() => expect(taken).toHaveLength(1), { timeout: 20_000 });
    await user.click(await screen.findByText('Undo', undefined, { timeout: 20_000 }));
    await waitFor(() => expect(taken).toHaveLength(2), { timeout: 20_000 });
    expect(taken[1].items[0]).toMatchObject({
      part: 'head',
      revision: 2,
      target_mass_kg: 2,
      density_kg_m3: null,
      material: null,
    });
  });

  it('shows who was quicker, keeps what was typed, and sets it over theirs only when told', async () => {
    const user = userEvent.setup({ delay: null });
    show();
    await user.click(await row('ox/head'));
    rows = rows.map((one) =>
      one.part === 'head' ? { ...one, revision: 9, target_mass_kg: 7, set_by: 'Odo Vane' } : one,
    );
    await user.keyboard('12 kg{Enter}');
    const title = await screen.findByText('Changed meanwhile', undefined, { timeout: 20_000 });
    const dialog = title.closest<HTMLElement>('[role=dialog]')!;
    expect(within(dialog).getByText(/Target mass 7/)).toBeInTheDocument();
    expect(within(dialog).getByText(/Odo Vane/)).toBeInTheDocument();
    expect(within(dialog).getByText(/target mass 12/)).toBeInTheDocument();
    expect(taken).toHaveLength(0);
    // The dialog takes the pointer one render after it stands.
    await waitFor(() => expect(getComputedStyle(dialog).pointerEvents).not.toBe('none'), { timeout: 20_000 });
    await user.click(within(dialog).getByText('Set mine over it'));
    await waitFor(() => expect(taken).toHaveLength(1), { timeout: 20_000 });
    expect(taken[0].items[0]).toMatchObject({ part: 'head', revision: 9, target_mass_kg: 12 });
  });

  it('shares a mass typed on an asset over its parts by volume', async () => {
    const user = userEvent.setup({ delay: null });
    rows = rows.map((one) => (one.part === 'head' ? { ...one, volume_m3: 6 } : one));
    show();
    await user.click(await row('ox/'));
    await user.keyboard('640{Enter}');
    await waitFor(() => expect(taken).toHaveLength(1), { timeout: 20_000 });
    expect(taken[0].items.map((item) => item.target_mass_kg)).toEqual([384, 128, 128]);
  });

  it('asks for the approval of what is chosen and has a value that nobody approved, against that value', async () => {
    const user = userEvent.setup({ delay: null });
    ask.mockClear();
    rows = rows.map((one) => ({ ...one, value_sha256: one.state === 'unset' ? null : (one.part ?? '').padEnd(64, '0'), value_id: one.part === 'horn_R' ? 'approved' : null }));
    show();
    await user.click(await row('ox/head'));
    await user.keyboard('{Control>}a{/Control}a');
    await user.type(await screen.findByLabelText('Note', undefined, { timeout: 20_000 }), 'for the lake');
    await user.click(within(screen.getByRole('dialog')).getByText('Ask'));
    await waitFor(() => expect(ask).toHaveBeenCalledTimes(1), { timeout: 20_000 });
    const items = ['head', 'horn_L'].map((part) => ({ asset: 'ox', part, value_sha256: part.padEnd(64, '0') }));
    expect(ask).toHaveBeenCalledWith({ show: 'tarn', items, note: 'for the lake' });
  });

  it('offers nothing to set to who may not', async () => {
    render(
      <NuqsTestingAdapter>
        <QueryClientProvider client={makeQueryClient()}>
          <TooltipProvider>
            <PartsTable frame={{ ...frame, may_set: false, may_import: false, may_ask: false }} actions={actions} />
          </TooltipProvider>
        </QueryClientProvider>
      </NuqsTestingAdapter>,
    );
    const user = userEvent.setup({ delay: null });
    await user.click(await row('ox/head'));
    await user.keyboard('5');
    expect(screen.queryByLabelText(/Mass, density/)).not.toBeInTheDocument();
    expect(screen.queryByText('Set mass')).not.toBeInTheDocument();
  });

  it('says what to do when the show is empty, and when it cannot be read', async () => {
    rows = [];
    const { unmount } = show();
    expect(await screen.findByText('No cages yet', undefined, { timeout: 20_000 })).toBeInTheDocument();
    unmount();
    vi.stubGlobal(
      'fetch',
      vi.fn(() => Promise.resolve(answer({ detail: 'You are not a member.', code: 'not_found' }, 404))),
    );
    show();
    expect(await screen.findByText('You are not a member.', undefined, { timeout: 20_000 })).toBeInTheDocument();
  });
});
