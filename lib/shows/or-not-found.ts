import { notFound } from 'next/navigation';
import { StudioError } from '@/lib/rules/studio-error';

/** For pages: what a verb does not find is the page for addresses where nothing is. */
export async function orNotFound<T>(found: Promise<T>): Promise<T> {
  try {
    return await found;
  } catch (error) {
    if (error instanceof StudioError && error.code === 'not_found') notFound();
    throw error;
  }
}
