import { route } from '@/lib/endpoint';
import { completeUpload } from '@/lib/imports/complete-upload';
import { completeUploadInput } from '@/lib/rules/inputs/upload-ref';

export const POST = route(completeUploadInput, completeUpload);
