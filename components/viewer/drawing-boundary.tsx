'use client';

import { Component, type ReactNode } from 'react';

/** A drawing that breaks does not take the numbers with it. */
export class DrawingBoundary extends Component<{ children: ReactNode }, { broken: boolean }> {
  override state = { broken: false };

  static getDerivedStateFromError() {
    return { broken: true };
  }

  override render() {
    if (!this.state.broken) return this.props.children;
    return (
      <p className="flex h-full items-center justify-center px-6 text-14 text-ink-2">
        The surface could not be drawn. The numbers stand beside it.
      </p>
    );
  }
}
