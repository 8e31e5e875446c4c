import type { ReactNode } from 'react';

/** A page that has only a sentence and a way on. Its beam has lost its balance: the fulcrum stands outside the extent. */
export function Notice({ title, action, children }: { title: string; action: ReactNode; children: ReactNode }) {
  return (
    <main className="flex min-h-dvh flex-col justify-center gap-4 px-6 md:px-[12vw]">
      <svg viewBox="0 0 300 44" aria-hidden fill="none" className="mb-4 w-full max-w-75">
        <path d="M1 12H236M1 4V20M236 4V20" stroke="var(--ink-2)" strokeWidth="2" />
        <path d="M60 8V16M177 8V16" stroke="var(--edge)" />
        <path d="M244 12H252M258 12H266" stroke="var(--wrong)" strokeWidth="2" />
        <path d="M282 16 294 38H270Z" fill="var(--wrong)" />
      </svg>
      <h1>{title}</h1>
      <p className="max-w-md text-ink-2">{children}</p>
      <div>{action}</div>
    </main>
  );
}
