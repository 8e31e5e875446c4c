import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import type { ReactNode } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { LockAsset } from '@/components/locks/lock-asset';
import { LockReport } from '@/components/locks/lock-report';
import { OutdatedLocks } from '@/components/locks/outdated-locks';
import { UnlockDialog } from '@/components/locks/unlock-dialog';
import { ShotPage } from '@/components/shots/shot-page';
import { TooltipProvider } from '@/components/ui/tooltip';
import type { ShotActions } from '@/hooks/use-shot-acts';
import { groupMissing } from '@/lib/rules/lock-answers';
import type { OutdatedLock } from '@/lib/rules/outdated-lock';
import type { ShotDetail, ShotSlot } from '@/lib/rules/shot-detail';
import { shotVerdict } from '@/lib/rules/shot-words';

const refresh = vi.fn();
vi.mock('next/navigation', () => ({ useRouter: () => ({ refresh, push: vi.fn() }) }));

const APPROVAL = '6a0f6a52-0f6b-4a53-8f0e-6f5f5f0a0001';
const NEWER = '6a0f6a52-0f6b-4a53-8f0e-6f5f5f0a0002';
const LOCK = '6a0f6a52-0f6b-4a53-8f0e-6f5f5f0a0003';

function slot(different: Partial<ShotSlot>): ShotSlot {
  return { shot: 'fer_0010', sequence: 'fer', asset: 'crate', copy: null, part: 'body', row: 'part', part_id: 'p', lock: null, override: null, current: { version: 'v002', state: 'approved', mass_kg: 4 }, ready_value_id: APPROVAL, outdated: null, ...different };
}

const lock = (taken: string[] = []): ShotSlot['lock'] => ({ id: LOCK, value_id: APPROVAL, version: 'v001', mass_kg: 2, locked_by: 'Ada Lead', locked_at: '2026-11-30T10:00:00.000Z', approved_by: 'Ada Lead', approved_at: '2026-11-30T09:00:00.000Z', of_override: false, taken_by: taken });

function outdated(different: Partial<OutdatedLock> = {}): OutdatedLock {
  return {
    lock: LOCK,
    shot: 'fer_0010',
    sequence: 'fer',
    copy: null,
    asset: 'crate',
    part: 'lid',
    body: null,
    part_id: 'q',
    why: 'changed',
    locked: { version: 'v001', value_id: APPROVAL, value_sha256: 'a', mass_kg: 2 },
    current: { version: 'v002', value_id: NEWER, value_sha256: 'b', mass_kg: 2.18 },
    state: 'approved',
    verdict: '+9 %, 31 mm along +z',
    beyond_tolerance: true,
    differences: { mass_change: 0.09, com_shift_m: [0, 0, 0.031], com_shift_of_size: 0.02, principal_change: [0.1, 0.11, 0.12], inertia_change: 0.11, rotation_deg: 1.5 },
    ...different,
  };
}

function shotOf(slots: ShotSlot[]): ShotDetail {
  return {
    code: 'fer_0010',
    sequence: 'fer',
    title: null,
    assets: [{ asset: 'crate', copies: 1 }],
    slots,
    locked: slots.filter((one) => one.lock).length,
    missing: slots.filter((one) => !one.lock).length,
    outdated: slots.filter((one) => one.outdated).length,
    pulls: [],
    since: null,
  };
}

const done = { ok: true as const, data: { items: [] } };

function actions(different: Partial<ShotActions> = {}): ShotActions {
  const refused = vi.fn().mockResolvedValue({ ok: false, code: 'bad_input', message: 'Not asked for.', field: null, errors: [] });
  return { put: refused, remove: refused, lockShots: refused, lockValues: refused, unlock: refused, relock: refused, draft: refused, drop: refused, ...different };
}

const frame = { code: 'tarn', title: 'Tarn', linear_unit: 'cm' as const, up_axis: 'y' as const, may_set: true, may_import: true, may_ask: true, may_approve: true };
const EVERYTHING = { may_edit: true, may_lock: true, may_draft: true };

function show(node: ReactNode) {
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  return { user: userEvent.setup(), ...render(<QueryClientProvider client={client}><TooltipProvider>{node}</TooltipProvider></QueryClientProvider>) };
}

const page = (slots: ShotSlot[], given: Partial<ShotActions>, acts = EVERYTHING) => show(<ShotPage frame={frame} acts={acts} shot={shotOf(slots)} assets={['crate']} actions={actions(given)} tellMe={null} />);

describe('locking a shot', () => {
  it('says how many were locked, and what is missing and why', async () => {
    const lockShots = vi.fn().mockResolvedValue({ ok: true, data: { locked: 1, missing: [{ shot: 'fer_0010', asset: 'crate', part: 'lid', copy: '', state: 'unset', override: false }] } });
    const { user } = page([slot({}), slot({ part: 'lid', ready_value_id: null, current: { version: 'v002', state: 'unset', mass_kg: null } })], { lockShots });
    await user.click(screen.getByRole('button', { name: 'Lock shot' }));
    expect(lockShots).toHaveBeenCalledExactlyOnceWith({ show: 'tarn', shots: ['fer_0010'] });
    const report = await screen.findByText(/1 part locked\. 1 missing/);
    expect(report.parentElement).toHaveTextContent('crate lid: no mass yet');
    expect(refresh).toHaveBeenCalled();
  });

  it('locks the chosen parts to their approved values, and names the others', async () => {
    const lockValues = vi.fn().mockResolvedValue(done);
    const { user } = page([slot({}), slot({ part: 'lid', ready_value_id: null, current: { version: 'v002', state: 'measured', mass_kg: 1 } })], { lockValues });
    await user.click(screen.getByRole('checkbox', { name: 'Every part of the shot' }));
    await user.click(screen.getByRole('button', { name: 'Lock 1' }));
    expect(lockValues).toHaveBeenCalledExactlyOnceWith({ show: 'tarn', shot: 'fer_0010', items: [{ asset: 'crate', part: 'body', copy: '', value_id: APPROVAL }] });
    expect(await screen.findByText('lid: not approved yet', { exact: false })).toBeInTheDocument();
  });

  it('is not offered to who may not lock', () => {
    page([slot({})], {}, { may_edit: false, may_lock: false, may_draft: true });
    expect(screen.queryByRole('button', { name: 'Lock shot' })).toBeNull();
    expect(screen.queryByRole('checkbox')).toBeNull();
  });
});

describe('unlocking', () => {
  it('names who took the rows and does not go without a reason', async () => {
    const unlock = vi.fn().mockResolvedValue(done);
    const { user } = page([slot({ lock: lock(['Hesta Quoin', 'Ilvo Brackmere']) })], { unlock });
    await user.click(screen.getByRole('checkbox', { name: 'crate body' }));
    await user.click(screen.getByRole('button', { name: 'Unlock 1…' }));
    const dialog = screen.getByRole('dialog', { name: 'Unlock crate body' });
    expect(dialog).toHaveTextContent('Taken by Hesta Quoin, Ilvo Brackmere.');
    await user.click(within(dialog).getByRole('button', { name: 'Unlock' }));
    expect(within(dialog).getByRole('alert')).toHaveTextContent('Say why.');
    expect(unlock).not.toHaveBeenCalled();
    await user.type(within(dialog).getByRole('textbox', { name: 'Reason' }), '  the crate goes ');
    await user.click(within(dialog).getByRole('button', { name: 'Unlock' }));
    expect(unlock).toHaveBeenCalledExactlyOnceWith({ show: 'tarn', shot: 'fer_0010', items: [{ lock: LOCK }], reason: 'the crate goes' });
    expect(screen.queryByRole('dialog')).toBeNull();
  });

  it('keeps what was typed where it is refused, and says why', async () => {
    const unlock = vi.fn().mockResolvedValue({ ok: false, code: 'conflict', message: 'crate/body is not locked in fer_0010 any more. Nothing was unlocked.', field: 'items.0', errors: [] });
    const { user } = page([slot({ lock: lock() })], { unlock });
    await user.click(screen.getByRole('checkbox', { name: 'crate body' }));
    await user.click(screen.getByRole('button', { name: 'Unlock 1…' }));
    await user.type(screen.getByRole('textbox', { name: 'Reason' }), 'wrong');
    await user.click(screen.getByRole('button', { name: 'Unlock' }));
    expect(await screen.findByText(/not locked in fer_0010 any more/)).toBeInTheDocument();
    expect(screen.getByRole('textbox', { name: 'Reason' })).toHaveValue('wrong');
  });

  it('says that nobody has taken the rows', () => {
    show(<UnlockDialog slots={[slot({ lock: lock() })]} shot="fer_0010" busy={false} refusal={null} onUnlock={vi.fn()} onClose={vi.fn()} />);
    expect(screen.getByRole('dialog')).toHaveTextContent('Nobody has taken these rows yet.');
  });
});

describe('re-locking', () => {
  const waiting = outdated({ lock: '6a0f6a52-0f6b-4a53-8f0e-6f5f5f0a0004', part: 'hinge', state: 'outdated', current: { version: 'v002', value_id: null, value_sha256: 'c', mass_kg: 3 } });

  it('shows every difference, leaves what has no approved value, and asks why', async () => {
    const relock = vi.fn().mockResolvedValue(done);
    const { user } = show(<OutdatedLocks show="tarn" unit="cm" locks={[outdated(), waiting]} mayLock primary relock={relock} />);
    expect(screen.getByRole('checkbox', { name: 'fer_0010 crate hinge' })).toBeDisabled();
    await user.click(screen.getByRole('button', { name: 'Re-lock 1…' }));
    const dialog = screen.getByRole('dialog', { name: 'Re-lock 1 part in 1 shot' });
    const [, row] = within(dialog).getAllByRole('row');
    // 9 % of mass, 31 mm shown in the show's cm, 2 % of the size, the three moments and the axes.
    for (const figure of ['2.180', '9.000', '3.100', '2.000', '10.00', '11.00', '12.00', '1.500']) expect(row).toHaveTextContent(figure);
    await user.click(within(dialog).getByRole('button', { name: 'Re-lock 1 part' }));
    expect(relock).not.toHaveBeenCalled();
    await user.type(within(dialog).getByRole('textbox', { name: 'Reason' }), 'hump');
    await user.click(within(dialog).getByRole('button', { name: 'Re-lock 1 part' }));
    expect(relock).toHaveBeenCalledExactlyOnceWith({ show: 'tarn', items: [{ lock: LOCK, value_id: NEWER }], reason: 'hump' });
    expect(await screen.findByText('1 part re-locked.')).toBeInTheDocument();
  });

  it('only looks, for who may not lock', () => {
    show(<OutdatedLocks show="tarn" unit="cm" locks={[outdated()]} mayLock={false} primary relock={vi.fn()} />);
    expect(screen.queryByRole('button')).toBeNull();
    expect(screen.getByRole('link', { name: /Compare/ })).toHaveAttribute('href', `/shows/tarn/compare?lock=${LOCK}`);
  });
});

describe('words on shots', () => {
  it.each([
    [{ locked: 4, missing: 0, outdated: 0 }, 'complete'],
    [{ locked: 4, missing: 2, outdated: 0 }, '2 missing'],
    [{ locked: 4, missing: 0, outdated: 1 }, '1 out of date'],
    [{ locked: 4, missing: 2, outdated: 1 }, '2 missing, 1 out of date'],
    [{ locked: 0, missing: 0, outdated: 0 }, 'nothing in it'],
  ])('%o is %s', (standing, words) => {
    expect(shotVerdict(standing)).toBe(words);
  });

  it('missing parts stand together by what they lack', () => {
    const one = (shot: string, part: string, state: 'unset' | 'measured') => ({ shot, asset: 'tarnOx', part, copy: '', state, override: false });
    const groups = groupMissing([one('a', 'torso', 'measured'), one('a', 'neck', 'unset'), one('b', 'neck', 'unset'), one('b', 'ear', 'unset')]);
    expect(groups).toEqual([
      { why: 'no mass yet', asset: 'tarnOx', parts: ['neck', 'ear'], shots: ['a', 'b'] },
      { why: 'not approved yet', asset: 'tarnOx', parts: ['torso'], shots: ['a'] },
    ]);
    show(<LockReport show="tarn" answer={{ locked: 0, missing: [one('a', 'torso', 'measured')] }} onClose={vi.fn()} />);
    expect(screen.getByRole('status')).toHaveTextContent(/^Nothing new was locked\. 1 missing: ?tarnOx torso: not approved yet$/);
  });
});

describe('locking an asset wherever it is', () => {
  it('locks what is approved in all its shots and says what is missing', async () => {
    const missing = [{ shot: 'fer_0010', asset: 'crate', part: 'lid', copy: '', state: 'measured' as const, override: false }];
    const lockShots = vi.fn().mockResolvedValue({ ok: true, data: { locked: 3, missing } });
    render(
      <QueryClientProvider client={new QueryClient()}>
        <TooltipProvider>
          <LockAsset show="tarn" asset="crate" lockShots={lockShots} />
        </TooltipProvider>
      </QueryClientProvider>,
    );
    await userEvent.click(screen.getByRole('button', { name: 'Lock what is approved in all its shots' }));
    expect(lockShots).toHaveBeenCalledWith({ show: 'tarn', shots: [], asset: 'crate' });
    expect(await screen.findByText(/3 parts locked\./)).toBeTruthy();
    expect(screen.getByText(/1 missing/)).toBeTruthy();
  });
});
