import { route } from '@/lib/endpoint';
import { createShowInput } from '@/lib/rules/inputs/create-show';
import { listShowsInput } from '@/lib/rules/inputs/list-shows';
import { createShow } from '@/lib/shows/create-show';
import { listShows } from '@/lib/shows/list-shows';

export const GET = route(listShowsInput, listShows);
export const POST = route(createShowInput, createShow, { status: 201 });
