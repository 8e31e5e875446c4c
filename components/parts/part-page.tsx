'use client';

import Link from 'next/link';
import { useMemo, useState } from 'react';
import { PartApproval } from '@/components/approvals/part-approval';
import { RowBeam } from '@/components/beam/row-beam';
import { StateMark } from '@/components/states/state-mark';
import { Button } from '@/components/ui/button';
import { Tabs } from '@/components/ui/tabs';
import { PartViewer } from '@/components/viewer/part-viewer';
import type { DrawnWeight } from '@/components/viewer/part-scene';
import { useAssetMesh } from '@/components/viewer/use-asset-mesh';
import { useMaterials } from '@/hooks/use-materials';
import { usePart } from '@/hooks/use-part';
import { useSaveActs } from '@/hooks/use-save-acts';
import { useSetValues } from '@/hooks/use-set-values';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import type { PartDetail } from '@/lib/rules/part-detail';
import { rowName } from '@/lib/rules/part-key';
import type { PartRow } from '@/lib/rules/part-row';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { sourceSentence } from '@/lib/rules/source-words';
import { CATEGORY_WORDS } from '@/lib/rules/states';
import { ConflictDialog } from './conflict-dialog';
import { Facts, Section } from './facts';
import { Findings } from './findings';
import { GeometryFacts } from './geometry-facts';
import { MeasuredAsFacts } from './measured-as-facts';
import { partHref } from './part-href';
import { PartSettings } from './part-settings';
import { PartShots } from './part-shots';
import { PartVersions } from './part-versions';
import { SetBy } from './set-by';
import { SetMassDialog } from './set-mass-dialog';
import { massFact, WeightFacts } from './weight-facts';

/** One part: its surface, its numbers, where they come from and what was set before. */
export function PartPage({ frame, initial, actions }: { frame: ShowFrame; initial: PartDetail; actions: ApprovalActions }) {
  const { data: detail } = usePart(frame.code, initial);
  const { row } = detail;
  const mesh = useAssetMesh(frame.code, row.asset, row.version);
  const materials = useMaterials(frame.code);
  const values = useSetValues(frame.code);
  const save = useSaveActs(values);
  const [setting, setSetting] = useState(false);
  const weight = useMemo(() => weightOf(row), [row]);
  const unit = frame.linear_unit;

  return (
    <>
      <header className="flex flex-wrap items-center gap-x-5 gap-y-2 border-b border-rule px-4 py-4 md:px-6">
        <div className="min-w-0">
          <p className="text-13 text-ink-2">
            <Link href={`/shows/${encodeURIComponent(frame.code)}`} className="link">
              Parts
            </Link>{' '}
            ·{' '}
            <Link href={`/shows/${encodeURIComponent(frame.code)}?q=${encodeURIComponent(row.asset)}`} className="link">
              {row.asset}
            </Link>{' '}
            · {CATEGORY_WORDS[row.category]} · <span className="font-mono">{row.version}</span> ·{' '}
            <Link href={`${partHref(frame.code, row)}/history`} className="link">
              History
            </Link>
          </p>
          <h1 className="break-words">{rowName(row)}</h1>
        </div>
        <StateMark state={row.state} />
        {frame.may_set ? (
          <Button look="filled" className="ml-auto" onClick={() => setSetting(true)}>
            Set mass
          </Button>
        ) : null}
      </header>
      <div className="grid lg:min-h-0 lg:flex-1 lg:grid-cols-[minmax(0,1fr)_22rem]">
        <div className="flex min-w-0 flex-col lg:min-h-0 lg:overflow-y-auto">
          <div className="flex h-[26rem] shrink-0 flex-col border-b border-rule lg:h-[min(36rem,62dvh)]">
            <PartViewer
              asset={mesh.data ?? null}
              part={rowName(row)}
              weight={weight}
              unit={unit}
              up={frame.up_axis}
              failure={mesh.isError ? mesh.error.message : null}
            />
          </div>
          <Tabs
            label="More about the part"
            className="px-4 pt-2 pb-8 md:px-6"
            tabs={[
              { value: 'shots', label: 'Shots', content: <PartShots show={frame.code} slots={detail.shots} /> },
              {
                value: 'versions',
                label: 'Versions',
                content: <PartVersions frame={frame} asset={row.asset} part={rowName(row)} versions={detail.versions} />,
              },
              { value: 'set', label: 'What was set', content: <PartSettings settings={detail.settings} unit={unit} /> },
              { value: 'measured', label: 'How it was measured', content: <MeasuredAsFacts detail={detail} /> },
            ]}
          />
        </div>
        <aside
          aria-label="Numbers"
          tabIndex={0}
          className="border-rule bg-bench pb-6 max-lg:border-t lg:overflow-y-auto lg:border-l"
        >
          {detail.findings.length === 0 ? null : (
            <Section title="Problems and warnings">
              <Findings findings={detail.findings} />
            </Section>
          )}
          {detail.approval === null ? null : (
            <Section title="Approval">
              <PartApproval frame={frame} row={detail.approval} actions={actions} />
            </Section>
          )}
          <Section title="Balance along the longest axis">
            <RowBeam of={row} unit={unit} approved={detail.approval?.last?.com_m ?? null} />
          </Section>
          <Section title="Mass">
            <Facts facts={[massFact(row.mass_kg), { label: 'Construction', value: row.construction }]} />
            <p className="mt-1 text-13 text-ink-2">{sourceSentence(row)}</p>
            <SetBy row={row} />
          </Section>
          <WeightFacts of={row} unit={unit} />
          <Section title="Limit surface">
            <GeometryFacts row={row} unit={unit} />
          </Section>
        </aside>
      </div>
      <SetMassDialog
        rows={setting ? [row] : null}
        frame={frame}
        materials={materials}
        busy={values.saving.size > 0}
        onSet={(changes) => {
          setSetting(false);
          void save.set(changes);
        }}
        onClose={() => setSetting(false)}
      />
      <ConflictDialog
        unit={frame.linear_unit}
        conflict={save.conflict}
        onKeepTheirs={save.keepTheirs}
        onSetMine={(changes) => void save.set(changes)}
        onClose={save.leaveConflict}
      />
    </>
  );
}

/** What the drawing needs of the row; null while it has no mass. */
function weightOf(row: PartRow): DrawnWeight | null {
  const numbers = [
    row.mass_kg,
    row.com_x_m,
    row.com_y_m,
    row.com_z_m,
    row.i1_kg_m2,
    row.i2_kg_m2,
    row.i3_kg_m2,
    row.axes_quat_w,
    row.axes_quat_x,
    row.axes_quat_y,
    row.axes_quat_z,
  ];
  if (!numbers.every((value) => value !== null)) return null;
  const [massKg, x, y, z, i1, i2, i3, qw, qx, qy, qz] = numbers;
  return {
    massKg,
    centreM: [x, y, z],
    momentsKgM2: [i1, i2, i3],
    quatWxyz: [qw, qx, qy, qz],
    freeAxes: row.free_axes ?? '',
  };
}
