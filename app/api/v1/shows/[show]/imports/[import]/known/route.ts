import { route } from '@/lib/endpoint';
import { takeKnownFiles } from '@/lib/imports/take-known-files';
import { takeKnownFilesInput } from '@/lib/rules/inputs/take-known-files';

export const POST = route(takeKnownFilesInput, takeKnownFiles);
