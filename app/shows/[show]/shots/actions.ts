'use server';

import { action } from '@/lib/endpoint';
import { lockShots } from '@/lib/locks/lock-shots';
import { lockValues } from '@/lib/locks/lock-values';
import { relockValues } from '@/lib/locks/relock-values';
import { unlockValues } from '@/lib/locks/unlock-values';
import { dropOverride } from '@/lib/overrides/drop-overrides';
import { dropOverrideInput } from '@/lib/rules/inputs/drop-override';
import { lockShotsInput, lockValuesInput, relockValuesInput, unlockValuesInput } from '@/lib/rules/inputs/lock-values';
import { putShotsInput } from '@/lib/rules/inputs/put-shots';
import { removeFromShotInput } from '@/lib/rules/inputs/remove-from-shot';
import { setValuesInput } from '@/lib/rules/inputs/set-values';
import { setValues } from '@/lib/settings/set-values';
import { planShots } from '@/lib/shots/plan-shots';
import { putShots } from '@/lib/shots/put-shots';
import { removeFromShot } from '@/lib/shots/remove-from-shot';

export const putShotsAction = action(putShotsInput, putShots);
export const planShotsAction = action(putShotsInput, planShots);
export const removeFromShotAction = action(removeFromShotInput, removeFromShot);
export const lockShotsAction = action(lockShotsInput, lockShots);
export const lockValuesAction = action(lockValuesInput, lockValues);
export const unlockValuesAction = action(unlockValuesInput, unlockValues);
export const relockValuesAction = action(relockValuesInput, relockValues);
export const draftOverrideAction = action(setValuesInput, setValues);
export const dropOverrideAction = action(dropOverrideInput, dropOverride);
