'use client';

import { useQuery } from '@tanstack/react-query';
import { RequestError } from '@/hooks/request-json';
import { readAssetMesh, type DrawnAsset } from './read-asset-mesh';

/** The display mesh of an asset's version, of the one named. It is made on first view, which may take some seconds for a dense cage. */
export function useAssetMesh(show: string, asset: string, version: string) {
  return useQuery({
    queryKey: ['mesh', show, asset, version],
    queryFn: async ({ signal }): Promise<DrawnAsset> => {
      const path = `/api/v1/shows/${encodeURIComponent(show)}/assets/${encodeURIComponent(asset)}/mesh?version=${encodeURIComponent(version)}`;
      const response = await fetch(path, { signal });
      if (!response.ok) throw new RequestError(response.status, 'not_drawn', 'The surface could not be read.');
      return readAssetMesh(await response.arrayBuffer());
    },
    staleTime: Infinity,
    gcTime: 60_000,
  });
}
