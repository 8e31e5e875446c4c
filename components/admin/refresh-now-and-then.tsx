'use client';

import { useRouter } from 'next/navigation';
import { useEffect } from 'react';

const EVERY_MS = 5_000;

/** Reads the page again every few seconds for as long as somebody sees it. */
export function RefreshNowAndThen() {
  const router = useRouter();
  useEffect(() => {
    const timer = setInterval(() => document.visibilityState === 'visible' && router.refresh(), EVERY_MS);
    return () => clearInterval(timer);
  }, [router]);
  return null;
}
