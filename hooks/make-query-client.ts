import { QueryClient } from '@tanstack/react-query';
import { RequestError } from '@/hooks/request-json';

/** Answers that will not change by asking again are not asked for again. */
export function makeQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 30_000,
        retry: (failures, error) =>
          failures < 2 && !(error instanceof RequestError && error.status >= 400 && error.status < 500),
      },
    },
  });
}
