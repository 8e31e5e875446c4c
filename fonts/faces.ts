import localFont from 'next/font/local';

// Only the latin subset is preloaded; names with other letters fetch the extended files when a page needs them.
export const splineSans = localFont({
  src: './spline-sans-latin-wght-normal.woff2',
  weight: '300 700',
  variable: '--face-sans',
  display: 'swap',
});

export const splineSansExtended = localFont({
  src: './spline-sans-latin-ext-wght-normal.woff2',
  weight: '300 700',
  variable: '--face-sans-extended',
  display: 'swap',
  preload: false,
  adjustFontFallback: false,
  declarations: [
    {
      prop: 'unicode-range',
      value: 'U+0100-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+02DD-02FF, U+1E00-1E9F, U+1EF2-1EFF',
    },
  ],
});

export const splineSansMono = localFont({
  src: './spline-sans-mono-latin-wght-normal.woff2',
  weight: '300 700',
  variable: '--face-mono',
  display: 'swap',
});

export const splineSansMonoExtended = localFont({
  src: './spline-sans-mono-latin-ext-wght-normal.woff2',
  weight: '300 700',
  variable: '--face-mono-extended',
  display: 'swap',
  preload: false,
  adjustFontFallback: false,
  declarations: [
    {
      prop: 'unicode-range',
      value: 'U+0100-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+02DD-02FF, U+1E00-1E9F, U+1EF2-1EFF',
    },
  ],
});
