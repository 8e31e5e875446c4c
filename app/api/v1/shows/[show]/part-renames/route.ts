import { route } from '@/lib/endpoint';
import { decidePartRenames } from '@/lib/parts/decide-part-renames';
import { listPartRenames } from '@/lib/parts/list-part-renames';
import { decidePartRenamesInput, listPartRenamesInput } from '@/lib/rules/inputs/part-renames';

export const GET = route(listPartRenamesInput, listPartRenames);
export const POST = route(decidePartRenamesInput, decidePartRenames, { status: 201 });
