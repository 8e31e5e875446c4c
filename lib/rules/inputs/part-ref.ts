import { z } from 'zod';
import { showRef } from '../fields';

/** An asset of a show by its code. Whatever stands there, it either exists for the caller or it does not. */
export const assetRefInput = z.strictObject({ show: showRef, asset: z.string().min(1).max(128) });
export type AssetRefInput = z.infer<typeof assetRefInput>;

/** A part of an asset by its name. */
export const partRefInput = z.strictObject({ show: showRef, asset: z.string().min(1).max(128), part: z.string().min(1).max(1000) });
export type PartRefInput = z.infer<typeof partRefInput>;
