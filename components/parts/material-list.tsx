'use client';

import { Command } from 'cmdk';
import { Check } from 'lucide-react';
import { formatProse } from '@/lib/rules/format-figure';
import type { MaterialOption } from '@/lib/rules/show-frame';

interface MaterialListProps {
  materials: readonly MaterialOption[];
  value: string | null;
  onChoose: (name: string) => void;
}

/** The show's materials with their densities, found by typing. */
export function MaterialList({ materials, value, onChoose }: MaterialListProps) {
  return (
    <Command label="Material" defaultValue={value ?? undefined} className="rounded border border-edge bg-ground">
      <Command.Input
        placeholder="Find a material"
        className="h-8 w-full border-b border-rule bg-transparent px-2.5 text-14 text-ink outline-none focus-visible:border-brass"
      />
      <Command.List className="max-h-52 overflow-y-auto p-1">
        <Command.Empty className="px-2 py-3 text-13 text-ink-3">No material of that name.</Command.Empty>
        {materials.map((material) => (
          <Command.Item
            key={material.name}
            value={material.name}
            keywords={[material.category]}
            onSelect={() => onChoose(material.name)}
            className="flex min-h-7 items-center gap-2 rounded px-2 text-13 text-ink data-[selected=true]:bg-selected"
          >
            <Check
              aria-hidden
              className={value === material.name ? 'size-3.5 shrink-0 text-brass' : 'size-3.5 shrink-0 opacity-0'}
            />
            <span className="min-w-0 flex-1 truncate">{material.name}</span>
            {value === material.name ? <span className="sr-only">chosen</span> : null}
            <span className="shrink-0 text-ink-3">{densityWords(material)}</span>
          </Command.Item>
        ))}
      </Command.List>
    </Command>
  );
}

function densityWords(material: MaterialOption): string {
  return material.density_kg_m3 === null
    ? `${formatProse(material.areal_density_kg_m2 ?? 0)} kg/m²`
    : `${formatProse(material.density_kg_m3)} kg/m³`;
}
