/** Request header in which proxy.ts tells a page its own path and query; what a client sends under this name is overwritten. */
export const PATH_HEADER = 'x-weighhouse-path';
