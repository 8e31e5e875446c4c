'use client';

import Link from 'next/link';
import { useState, type ReactNode } from 'react';
import { AssetApproval } from '@/components/approvals/asset-approval';
import { RowBeam } from '@/components/beam/row-beam';
import { Facts, Section } from '@/components/parts/facts';
import { Findings } from '@/components/parts/findings';
import { massFact, WeightFacts } from '@/components/parts/weight-facts';
import { StateMark } from '@/components/states/state-mark';
import { PartViewer } from '@/components/viewer/part-viewer';
import { useAssetMesh } from '@/components/viewer/use-asset-mesh';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import type { AssetDetail } from '@/lib/rules/part-detail';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { CATEGORY_WORDS } from '@/lib/rules/states';
import { METRES_PER } from '@/lib/rules/units';
import { AssetParts } from './asset-parts';
import { AssetVersions } from './asset-versions';

interface AssetPageProps {
  frame: ShowFrame;
  detail: AssetDetail;
  actions: ApprovalActions;
  /** Locks it in its shots; null for whoever does not lock. */
  locking: ReactNode;
  tellMe: ReactNode;
  /** Parts that look renamed; nothing where none does. */
  renames: ReactNode;
}

/** An asset: its surface, its parts and what they weigh together. */
export function AssetPage({ frame, detail, actions, locking, tellMe, renames }: AssetPageProps) {
  const { total, parts, findings, versions, scale } = detail;
  const [chosen, setChosen] = useState(parts[0]?.part ?? '');
  const mesh = useAssetMesh(frame.code, total.asset, total.version);
  const unit = frame.linear_unit;
  const ofFile = findings.filter((finding) => finding.part === null);
  return (
    <>
      <header className="flex flex-wrap items-center gap-x-5 gap-y-2 border-b border-rule px-4 py-4 md:px-6">
        <div className="min-w-0">
          <p className="text-13 text-ink-2">
            <Link href={`/shows/${encodeURIComponent(frame.code)}`} className="link">
              Parts
            </Link>{' '}
            · {CATEGORY_WORDS[total.category]} · <span className="font-mono">{total.version}</span>
            {scale === 1 ? null : (
              <>
                {' '}
                · scale <span className="font-mono">{scale}</span>
              </>
            )}
          </p>
          <h1 className="break-words">{total.asset}</h1>
        </div>
        <StateMark state={total.state} />
      </header>
      {renames}
      <div className="grid lg:min-h-0 lg:flex-1 lg:grid-cols-[minmax(0,1fr)_22rem]">
        <div className="flex min-w-0 flex-col lg:min-h-0 lg:overflow-y-auto">
          <div className="flex h-[26rem] shrink-0 flex-col border-b border-rule lg:h-[min(36rem,58dvh)]">
            <PartViewer
              withRest
              asset={mesh.data ?? null}
              part={chosen}
              weight={null}
              unit={unit}
              up={frame.up_axis}
              failure={mesh.isError ? mesh.error.message : null}
            />
          </div>
          <section aria-label="Parts" className="shrink-0">
            <AssetParts frame={frame} rows={parts} chosen={chosen} onChoose={setChosen} />
          </section>
          <section className="shrink-0 px-4 pt-6 pb-8 md:px-6">
            <h2 className="mb-2">Versions</h2>
            <AssetVersions versions={versions} />
          </section>
        </div>
        <aside
          aria-label="Numbers"
          className="border-rule bg-bench pb-6 max-lg:border-t lg:overflow-y-auto lg:border-l"
        >
          {ofFile.length === 0 ? null : (
            <Section title="In the whole file">
              <Findings findings={ofFile} />
            </Section>
          )}
          <Section title="Approval">
            <AssetApproval frame={frame} asset={total.asset} rows={detail.approvals} actions={actions} />
          </Section>
          {locking === null ? null : <Section title="Shots">{locking}</Section>}
          <Section title="Balance along the longest axis">
            <RowBeam of={total} unit={unit} />
          </Section>
          <Section title="Mass of its parts together">
            <Facts
              facts={[
                massFact(total.mass_kg),
                {
                  label: 'Volume',
                  unit: `${unit}³`,
                  value: total.volume_m3 === null ? null : total.volume_m3 / METRES_PER[unit] ** 3,
                },
                { label: 'Parts', value: total.parts.toLocaleString('en') },
                { label: 'Without mass', value: total.without_mass.toLocaleString('en') },
                { label: 'Blocked', value: total.blocked.toLocaleString('en') },
              ]}
            />
          </Section>
          <WeightFacts of={total} unit={unit} />
          <Section title="Mail">{tellMe}</Section>
        </aside>
      </div>
    </>
  );
}
