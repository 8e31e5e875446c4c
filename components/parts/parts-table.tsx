'use client';

import { useRouter } from 'next/navigation';
import { useMemo, useRef, useState, type ClipboardEvent } from 'react';
import { toast } from 'sonner';
import { askableRows, useQuestion } from '@/components/approvals/use-question';
import { answerTableKey, type TableActs } from '@/hooks/answer-table-key';
import { useArrangedRows } from '@/hooks/use-arranged-rows';
import { useMaterials } from '@/hooks/use-materials';
import { useOnline } from '@/hooks/use-online';
import { usePartChanges } from '@/hooks/use-part-changes';
import { usePartFilters, type PartColumn } from '@/hooks/use-part-filters';
import { useParts } from '@/hooks/use-parts';
import { useSaveActs } from '@/hooks/use-save-acts';
import { useSetValues } from '@/hooks/use-set-values';
import { groupByAsset, partNodes, passes, type TableNode } from '@/lib/rules/arrange-parts';
import { entryChanges } from '@/lib/rules/entry-changes';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import type { MassEntry as Entry } from '@/lib/rules/parse-mass-entry';
import { assetKey, partKey } from '@/lib/rules/part-key';
import type { PartRow } from '@/lib/rules/part-row';
import { rowsAsText } from '@/lib/rules/rows-as-text';
import { moveActive, NO_SELECTION, selectRow, type SelectHow } from '@/lib/rules/select-rows';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { ConflictDialog } from './conflict-dialog';
import { Inspector } from './inspector';
import { MassEntry } from './mass-entry';
import { COLUMN_SPECS } from './part-columns';
import { partHref } from './part-href';
import { PartsGrid } from './parts-grid';
import { PartsHeading } from './parts-heading';
import { PartsKeys } from './parts-keys';
import { PartsStatusBar } from './parts-status-bar';
import { PartsToolbar } from './parts-toolbar';
import { PhoneActs } from './phone-acts';
import { SetMassDialog } from './set-mass-dialog';
import { NoParts, NothingFits, NotRead, TableSkeleton } from './table-states';

/** The show's parts: read, found, chosen and set. */
export function PartsTable({ frame, actions }: { frame: ShowFrame; actions: ApprovalActions }) {
  const router = useRouter();
  const online = useOnline();
  const parts = useParts(frame.code);
  usePartChanges(frame.code, parts.revision);
  const materials = useMaterials(frame.code);
  const materialNames = useMemo(() => materials.map((material) => material.name), [materials]);
  const values = useSetValues(frame.code);
  const save = useSaveActs(values);
  const question = useQuestion(frame, actions);
  const filters = usePartFilters();
  const [{ q, state, category, sort, down, flat, columns }, setFilters] = filters;

  const [selection, setSelection] = useState(NO_SELECTION);
  const [closed, setClosed] = useState<ReadonlySet<string>>(new Set());
  const [editing, setEditing] = useState<{ key: string; start: string } | null>(null);
  const [formRows, setFormRows] = useState<readonly PartRow[] | null>(null);
  const [keysOpen, setKeysOpen] = useState(false);
  // Closed at first: the columns of balance and volume need its place on most screens.
  const [inspectorOpen, setInspectorOpen] = useState(false);
  const searchRef = useRef<HTMLInputElement>(null);
  const gridRef = useRef<HTMLDivElement>(null);

  const all = useMemo(() => partNodes(parts.rows), [parts.rows]);
  const shown = useMemo(
    () => all.filter((node) => passes(node.row, { text: q, states: state, category })),
    [all, q, state, category],
  );
  const grouped = useMemo(() => (flat ? shown : groupByAsset(shown, parts.totals)), [flat, shown, parts.totals]);
  const order = useMemo(() => (sort === null ? null : { column: sort, down }), [sort, down]);
  const nodes = useArrangedRows(grouped, COLUMN_SPECS, order, closed);
  const selectable = useMemo(() => nodes.map((node) => ({ key: node.key, parts: keysOf(node) })), [nodes]);
  const massKg = useMemo(
    () => shown.reduce((sum, { row }) => sum + (row.state === 'left_out' ? 0 : (row.mass_kg ?? 0)), 0),
    [shown],
  );
  const assets = useMemo(() => new Set(shown.map(({ row }) => row.asset)).size, [shown]);

  const active = nodes.find((node) => node.key === selection.active) ?? null;
  const chosen = useMemo(() => shown.filter((node) => selection.chosen.has(node.key)), [shown, selection.chosen]);
  /** What an act changes: what is chosen, else the row that the keyboard stands on. */
  const targets = chosen.length > 0 ? chosen : active === null ? [] : active.kind === 'asset' ? active.parts : [active];
  const targetRows = targets.map((node) => node.row);

  const select = (key: string, how: SelectHow) => setSelection((now) => selectRow(now, selectable, key, how));
  const fold = (key: string, open: boolean) =>
    setClosed((now) => (open ? new Set([...now].filter((one) => one !== key)) : new Set([...now, key])));

  function edit(key: string, start: string) {
    if (!frame.may_set) return;
    const node = nodes.find((one) => one.key === key);
    if (node === undefined) return;
    if (!keysOf(node).every((part) => selection.chosen.has(part))) select(key, 'only');
    setEditing({ key, start });
  }

  function openForm() {
    if (frame.may_set && targetRows.length > 0) setFormRows(targetRows);
  }

  const askable = askableRows(targetRows);
  const openQuestion = frame.may_ask && askable.length > 0 ? () => question.open(askable) : null;

  function enter(entry: Entry) {
    const together = active?.kind === 'asset' && targets.length === active.parts.length;
    const changes = entryChanges(entry, targetRows, together);
    if (changes === null)
      return void toast.error('One of the parts has no volume, so the mass cannot be shared by it.');
    leaveEditor(true);
    void save.set(targetRows.map((row, index) => ({ row, change: changes[index] })));
    if (targetRows.length === 1) setSelection((now) => moveActive({ ...now, chosen: new Set() }, selectable, 1, false));
  }

  function leaveEditor(back: boolean) {
    setEditing(null);
    if (back) requestAnimationFrame(() => gridRef.current?.focus());
  }

  function open(node: TableNode | null) {
    if (node?.kind === 'part') router.push(partHref(frame.code, node.row));
    if (node?.kind === 'asset') fold(node.key, closed.has(node.key));
  }

  function orderBy(column: PartColumn) {
    void setFilters(
      sort !== column ? { sort: column, down: null } : down ? { sort: null, down: null } : { down: true },
    );
  }

  const acts: TableActs = {
    move: (steps, extend) => setSelection((now) => moveActive(now, selectable, steps, extend)),
    toggle: () => selection.active !== null && select(selection.active, 'toggle'),
    all: () => setSelection((now) => ({ ...now, chosen: new Set(shown.map(({ key }) => key)) })),
    none: () => setSelection((now) => ({ ...now, chosen: new Set() })),
    type: (start) => selection.active !== null && edit(selection.active, start),
    form: openForm,
    ask: () => openQuestion?.(),
    open: () => open(active),
    unfold: (wanted) =>
      active !== null && fold(active.kind === 'asset' ? active.key : assetKey(active.row.asset), wanted),
    undo: () => void save.takeBack(),
    find: () => searchRef.current?.focus(),
    inspect: () => setInspectorOpen((now) => !now),
    keys: () => setKeysOpen(true),
  };

  const editor =
    editing === null ? null : (
      <MassEntry
        start={editing.start}
        parts={targets.length}
        shared={active?.kind === 'asset'}
        materials={materialNames}
        onSet={enter}
        onLeave={leaveEditor}
      />
    );

  return (
    <>
      <PartsHeading frame={frame} counts={parts.counts} canSet={targets.length > 0} onSet={openForm} />
      <PartsToolbar
        counts={parts.counts}
        frame={frame}
        filters={filters}
        searchRef={searchRef}
        inspectorOpen={inspectorOpen}
        onInspector={acts.inspect}
      />
      <div className="flex min-h-0 flex-1">
        {parts.isPending && parts.fetchStatus === 'paused' ? (
          <NotRead message="There is no connection to the server." onRetry={() => void parts.refetch()} />
        ) : parts.isPending ? (
          <TableSkeleton />
        ) : parts.isError && parts.rows.length === 0 ? (
          <NotRead message={parts.error.message} onRetry={() => void parts.refetch()} />
        ) : parts.rows.length === 0 ? (
          <NoParts frame={frame} />
        ) : nodes.length === 0 ? (
          <NothingFits onClear={() => void setFilters({ q: null, state: null, category: null })} />
        ) : (
          <PartsGrid
            gridRef={gridRef}
            nodes={nodes}
            frame={frame}
            selection={selection}
            saving={values.saving}
            closed={closed}
            sort={sort}
            down={down}
            columns={columns}
            editing={editing === null ? null : { key: editing.key, editor }}
            onSort={orderBy}
            onSelect={select}
            onToggleOpen={(key) => fold(key, closed.has(key))}
            onEdit={(key) => edit(key, '')}
            onOpen={(key) => open(nodes.find((node) => node.key === key) ?? null)}
            onCopy={(event) => copyRows(event, targetRows)}
            onKey={(event, pageRows) => answerTableKey(event, acts, pageRows)}
          />
        )}
        {inspectorOpen && parts.rows.length > 0 ? (
          <aside
            aria-label="Inspector"
            tabIndex={0}
            className="w-74 shrink-0 overflow-y-auto border-l border-rule bg-bench max-lg:hidden"
          >
            <Inspector active={active} chosen={targets} shown={shown} frame={frame} onSet={openForm} onAsk={openQuestion} />
          </aside>
        ) : null}
      </div>
      <PhoneActs chosen={targetRows} frame={frame} onSet={openForm} onAsk={openQuestion} onLetGo={acts.none} />
      <PartsStatusBar
        parts={shown.length}
        assets={assets}
        chosen={chosen.length}
        massKg={massKg}
        reading={!parts.complete && !parts.isError && parts.rows.length > 0}
        onReadRest={parts.isError && parts.rows.length > 0 && !parts.complete ? () => void parts.fetchNextPage() : null}
        online={online}
        onKeys={acts.keys}
      />
      <SetMassDialog
        key={formRows?.map(partKey).join('\n')}
        rows={formRows}
        frame={frame}
        materials={materials}
        busy={values.saving.size > 0}
        onSet={(changes) => {
          setFormRows(null);
          void save.set(changes);
        }}
        onClose={() => setFormRows(null)}
      />
      <ConflictDialog
        unit={frame.linear_unit}
        conflict={save.conflict}
        onKeepTheirs={save.keepTheirs}
        onSetMine={(changes) => void save.set(changes)}
        onClose={save.leaveConflict}
      />
      {question.dialog}
      <PartsKeys open={keysOpen} onClose={() => setKeysOpen(false)} />
    </>
  );
}

function keysOf(node: TableNode): readonly string[] {
  return node.kind === 'asset' ? node.parts.map((part) => part.key) : [node.key];
}

/** Ctrl+C with no text marked takes the rows. */
function copyRows(event: ClipboardEvent, rows: readonly PartRow[]): void {
  if (rows.length === 0 || document.getSelection()?.isCollapsed === false) return;
  event.clipboardData.setData('text/plain', rowsAsText(rows));
  event.preventDefault();
  toast(
    rows.length === 1 ? 'One row copied, all digits' : `${rows.length.toLocaleString('en')} rows copied, all digits`,
  );
}
