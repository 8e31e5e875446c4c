import { route } from '@/lib/endpoint';
import { putUploadPart } from '@/lib/imports/put-upload-part';
import { putUploadPartInput } from '@/lib/rules/inputs/upload-ref';

export const PUT = route(putUploadPartInput, putUploadPart, { rawBody: true });
