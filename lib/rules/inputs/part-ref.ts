import { z } from 'zod';
import { showRef } from '../fields';

/** An asset of a show by its code. Whatever stands there, it either exists for the caller or it does not. */
export const assetRefInput = z.strictObject({ show: showRef, asset: z.string().min(1).max(128) });
export type AssetRefInput = z.infer<typeof assetRefInput>;

/** A label such as v012 or v012-2. */
export const versionLabel = z.string().min(1).max(64);

/** An asset's display mesh, of its current version unless another is named. */
export const assetMeshInput = assetRefInput.extend({ version: versionLabel.optional() });
export type AssetMeshInput = z.infer<typeof assetMeshInput>;

/** A part of an asset by its name. */
export const partRefInput = z.strictObject({ show: showRef, asset: z.string().min(1).max(128), part: z.string().min(1).max(1000) });
export type PartRefInput = z.infer<typeof partRefInput>;
