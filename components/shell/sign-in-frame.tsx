import type { ReactNode } from 'react';
import { Mark } from './mark';
import { WeighBeam } from './weigh-beam';

/** The look of the pages outside a show: sign-in, invitation, password reset. */
export function SignInFrame({ title, children }: { title: string; children: ReactNode }) {
  return (
    <div className="grid min-h-dvh grid-rows-[auto_1fr] lg:grid-cols-[1fr_26rem] lg:grid-rows-1">
      <div className="flex flex-col justify-between gap-2 px-6 pt-6 lg:p-10">
        <p className="flex items-center gap-3 text-16 font-medium">
          <Mark className="h-6 w-8" />
          Weighhouse
        </p>
        <WeighBeam className="mx-auto w-full max-w-72 sm:max-w-md lg:max-w-2xl" />
        <p className="text-14 text-ink-2 max-lg:hidden">
          How heavy each part of a show is, where it balances, and how it resists turning.
        </p>
      </div>
      <main className="flex flex-col justify-start border-rule bg-bench px-6 py-8 max-lg:border-t lg:justify-center lg:border-l lg:px-12">
        <h1 className="mb-6">{title}</h1>
        {children}
      </main>
    </div>
  );
}
