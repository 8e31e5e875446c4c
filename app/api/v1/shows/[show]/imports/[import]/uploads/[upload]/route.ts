import { route } from '@/lib/endpoint';
import { cancelUpload } from '@/lib/imports/cancel-upload';
import { getUpload } from '@/lib/imports/get-upload';
import { uploadRefInput } from '@/lib/rules/inputs/upload-ref';

export const GET = route(uploadRefInput, getUpload);
export const DELETE = route(uploadRefInput, cancelUpload, { status: 204 });
