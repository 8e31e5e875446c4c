import { goesUp, type DeskRow } from '@/hooks/use-import-desk';

export interface DeskFilter {
  key: string;
  label: string;
  holds: (row: DeskRow) => boolean;
}

/** Ways to look at the files of a drop; those that hold none are not offered. */
export const DESK_FILTERS: readonly [DeskFilter, ...DeskFilter[]] = [
  { key: 'all', label: 'All', holds: () => true },
  { key: 'look', label: 'Needs a look', holds: ({ preview, archive }) => ((preview ?? archive)?.attention ?? 0) > 0 },
  { key: 'unmatched', label: 'No asset', holds: (row) => row.preview?.outcome === 'unmatched' },
  { key: 'new_asset', label: 'New assets', holds: (row) => row.preview?.outcome === 'new_asset' },
  { key: 'new_version', label: 'New versions', holds: (row) => row.preview?.outcome === 'new_version' },
  { key: 'next_take', label: 'Next takes', holds: (row) => row.preview?.outcome === 'next_take' },
  { key: 'unchanged', label: 'Unchanged', holds: (row) => row.preview?.outcome === 'unchanged' },
  { key: 'unpacked', label: 'Unpacked', holds: (row) => row.archive !== null },
  { key: 'guessed', label: 'Category guessed', holds: (row) => row.preview?.categoryGuessed === true },
  { key: 'said', label: 'Said by hand', holds: ({ said }) => said.asset !== null || said.version !== null || said.category !== null },
  { key: 'stays', label: 'Stays here', holds: (row) => row.stays !== null || !goesUp(row) },
  { key: 'failed', label: 'Not sent', holds: (row) => row.upload?.state === 'failed' },
];
