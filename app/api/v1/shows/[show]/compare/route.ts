import { getComparison } from '@/lib/compare/get-comparison';
import { route } from '@/lib/endpoint';
import { getComparisonInput } from '@/lib/rules/inputs/get-comparison';

export const GET = route(getComparisonInput, getComparison);
