import { route } from '@/lib/endpoint';
import { announceUpload } from '@/lib/imports/announce-upload';
import { announceUploadInput } from '@/lib/rules/inputs/announce-upload';

export const POST = route(announceUploadInput, announceUpload);
