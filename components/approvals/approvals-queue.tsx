'use client';

import { useRouter } from 'next/navigation';
import { useCallback, useMemo, useRef, useState } from 'react';
import { toast } from 'sonner';
import { NotRead, TableSkeleton } from '@/components/parts/table-states';
import { answerQueueKey, type QueueActs } from '@/hooks/answer-queue-key';
import { approvalOf, useApprovalActs, type ActRefusal } from '@/hooks/use-approval-acts';
import { useQueue } from '@/hooks/use-queue';
import { useQueueFilter } from '@/hooks/use-queue-filter';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import { queueKey, whyNotApprovable, withoutWarnings, type QueueRow } from '@/lib/rules/approval-queue';
import { arrangeQueue, keyAfter, selectableNodes, type QueueAssetNode } from '@/lib/rules/arrange-queue';
import { compareHref } from '@/lib/rules/compare-href';
import { moveActive, NO_SELECTION, selectRow } from '@/lib/rules/select-rows';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { CarryOverDialog } from './carry-over-dialog';
import { QueueEmpty } from './queue-empty';
import { QueueFooter } from './queue-footer';
import { QueueGrid } from './queue-grid';
import { QueueHeading } from './queue-heading';
import { QueueKeys } from './queue-keys';
import { QueueToolbar } from './queue-toolbar';
import { WordsDialog, type WordsWish } from './words-dialog';
import { noteWish, questionWish, takeBackWish } from './words-wishes';

/** What waits for an approval: looked at, approved, taken back; after each act the keyboard stands on the next value. */
export function ApprovalsQueue({ frame, actions }: { frame: ShowFrame; actions: ApprovalActions }) {
  const router = useRouter();
  const [filter, setFilter] = useQueueFilter();
  const queue = useQueue(frame.code, filter);
  const acts = useApprovalActs(frame.code, actions);
  const [selection, setSelection] = useState(NO_SELECTION);
  const [wish, setWish] = useState<WordsWish | null>(null);
  const [carrying, setCarrying] = useState(false);
  const [keysOpen, setKeysOpen] = useState(false);
  const gridRef = useRef<HTMLDivElement>(null);

  const nodes = useMemo(() => arrangeQueue(queue.rows), [queue.rows]);
  const selectable = useMemo(() => selectableNodes(nodes), [nodes]);
  // The first value is where the keyboard begins, and where it goes on when the active one has left.
  const activeKey = nodes.some((node) => node.key === selection.active)
    ? selection.active
    : (nodes.find((node) => node.kind === 'value')?.key ?? null);
  const standing = { ...selection, active: activeKey };
  const active = nodes.find((node) => node.key === activeKey) ?? null;
  const chosen = queue.rows.filter((row) => selection.chosen.has(queueKey(row)));
  const targets =
    chosen.length > 0 ? chosen : active === null ? [] : active.kind === 'asset' ? active.rows : [active.row];

  const { hasNextPage, isFetching, fetchNextPage } = queue;
  const readOn = useCallback(() => {
    if (hasNextPage && !isFetching) void fetchNextPage();
  }, [hasNextPage, isFetching, fetchNextPage]);

  function moveOn(acted: readonly QueueRow[]) {
    const keys = new Set(acted.map(queueKey));
    const next = keyAfter(nodes, activeKey, keys);
    setSelection({ chosen: new Set(), anchor: next, active: next });
    requestAnimationFrame(() => gridRef.current?.focus());
  }

  /** Sends one act; the queue moves on when it was done, and stays with what was refused. */
  async function act(leaving: readonly QueueRow[], send: () => Promise<ActRefusal>): Promise<ActRefusal> {
    const refused = await send();
    if (refused === null) moveOn(leaving);
    return refused;
  }

  /** The same where no dialog says what was refused. */
  async function actAtOnce(leaving: readonly QueueRow[], send: () => Promise<ActRefusal>): Promise<void> {
    const refused = await act(leaving, send);
    if (refused !== null && !refused.placed) toast.error(refused.message, { duration: 20_000 });
  }

  /** The rows that the reader may approve; says why where none is. */
  function approvable(rows: readonly QueueRow[]): QueueRow[] {
    const able = rows.filter((row) => whyNotApprovable(row) === null);
    if (able.length === 0 && rows.length > 0) toast(whyNotApprovable(rows[0]) ?? '');
    return able;
  }

  async function approveAsset(node: QueueAssetNode) {
    let rows = node.rows;
    // The asset at the end of what was read may go on: all of it is read before it is approved.
    if (node.rows.at(-1) === queue.rows.at(-1) && hasNextPage) {
      const read = await queue.fetchNextPage();
      const all = read.data?.pages.flatMap((page) => page.items) ?? [];
      if (all.at(-1)?.asset === node.asset && read.hasNextPage)
        return void toast('The asset is still being read. Try again in a moment.');
      rows = all.filter((row) => row.asset === node.asset);
    }
    const able = withoutWarnings(rows);
    if (able.length > 0) await actAtOnce(able, () => acts.approve(able, ''));
  }

  const keys: QueueActs = {
    move: (steps, extend) => setSelection(moveActive(standing, selectable, steps, extend)),
    toggle: () => activeKey !== null && setSelection(selectRow(standing, selectable, activeKey, 'toggle')),
    all: () => setSelection({ ...standing, chosen: new Set(queue.rows.map(queueKey)) }),
    none: () => {
      setSelection({ ...standing, chosen: new Set() });
      acts.forget();
    },
    approve: () => {
      if (!frame.may_approve || acts.busy) return;
      const rows = approvable(targets);
      if (rows.length > 0) void actAtOnce(rows, () => acts.approve(rows, ''));
    },
    approveAsset: () => {
      const of = nodes.find(
        (node) =>
          node.kind === 'asset' &&
          active !== null &&
          node.asset === (active.kind === 'asset' ? active.asset : active.row.asset),
      );
      if (frame.may_approve && !acts.busy && of?.kind === 'asset') void approveAsset(of);
    },
    note: () => {
      if (!frame.may_approve) return;
      const rows = approvable(targets);
      if (rows.length > 0) setWish(noteWish(rows, (note) => act(rows, () => acts.approve(rows, note))));
    },
    takeBack: () => {
      if (!frame.may_approve) return;
      const rows = targets.filter((row) => approvalOf(row) !== null);
      if (rows.length === 0) return void (targets.length > 0 && toast('There is no approval to take back.'));
      setWish(
        takeBackWish(rows, (reason) => act(filter === 'approved' ? rows : [], () => acts.takeBack(rows, reason))),
      );
    },
    ask: () => {
      if (!frame.may_ask) return;
      const own = targets.filter((row) => row.request?.own);
      if (own.length > 0) return void actAtOnce([], () => acts.takeQuestionBack(own));
      const rows = targets.filter((row) => row.value_id === null && row.shot === null);
      if (rows.length > 0)
        setWish(
          questionWish(rows.length === 1 ? `${rows[0].asset} ${rows[0].part}` : `${rows.length} values`, (note) =>
            act([], () => acts.ask(rows, note)),
          ),
        );
    },
    carryOver: () => frame.may_approve && setCarrying(true),
    compare: () => {
      const row = active?.kind === 'value' ? active.row : null;
      const asset = active?.kind === 'asset' ? active.asset : null;
      if (row !== null) router.push(compareHref(frame.code, { asset: row.asset, part: row.part, shot: row.shot }));
      else if (asset !== null) router.push(compareHref(frame.code, { asset }));
    },
    open: () => active?.kind === 'value' && open(active.row),
    keys: () => setKeysOpen(true),
  };

  function open(row: QueueRow) {
    router.push(
      `/shows/${encodeURIComponent(frame.code)}/assets/${encodeURIComponent(row.asset)}/${encodeURIComponent(row.part)}`,
    );
  }

  return (
    <>
      <QueueHeading
        frame={frame}
        targets={targets}
        chosen={chosen.length}
        outdated={queue.counts?.outdated ?? 0}
        busy={acts.busy}
        acts={keys}
      />
      <QueueToolbar
        frame={frame}
        counts={queue.counts}
        filter={filter}
        onFilter={(next) => {
          setSelection(NO_SELECTION);
          void setFilter(next === 'waiting' ? null : next);
        }}
      />
      <div className="flex min-h-0 flex-1">
        {queue.isPending ? (
          <TableSkeleton />
        ) : queue.isError && queue.rows.length === 0 ? (
          <NotRead message={queue.error.message} onRetry={() => void queue.refetch()} />
        ) : nodes.length === 0 ? (
          <QueueEmpty frame={frame} filter={filter} counts={queue.counts} onFilter={(next) => void setFilter(next)} />
        ) : (
          <QueueGrid
            gridRef={gridRef}
            nodes={nodes}
            frame={frame}
            selection={standing}
            refusals={acts.refusals}
            onSelect={(key, how) => setSelection(selectRow(standing, selectable, key, how))}
            onOpen={(key) => {
              const node = nodes.find((one) => one.key === key);
              if (node?.kind === 'value') open(node.row);
            }}
            onApproveAsset={(node) => void approveAsset(node)}
            onNearEnd={readOn}
            onKey={(event, pageRows) => answerQueueKey(event, keys, pageRows)}
          />
        )}
      </div>
      <QueueFooter
        shown={queue.rows.length}
        counts={queue.counts}
        filter={filter}
        chosen={chosen.length}
        mayApprove={frame.may_approve}
        onKeys={keys.keys}
      />
      <WordsDialog wish={wish} onClose={() => setWish(null)} />
      {carrying ? (
        <CarryOverDialog
          show={frame.code}
          onCarry={(rows) => acts.carryOver(rows, '')}
          onClose={() => setCarrying(false)}
        />
      ) : null}
      <QueueKeys
        mayApprove={frame.may_approve}
        mayAsk={frame.may_ask}
        open={keysOpen}
        onClose={() => setKeysOpen(false)}
      />
    </>
  );
}
