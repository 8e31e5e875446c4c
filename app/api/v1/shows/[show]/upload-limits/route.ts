import { route } from '@/lib/endpoint';
import { getUploadLimits } from '@/lib/imports/get-upload-limits';
import { importPreparationInput } from '@/lib/rules/inputs/import-preparation';

export const GET = route(importPreparationInput, getUploadLimits);
