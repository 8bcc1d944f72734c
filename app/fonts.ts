/**
 * The two bundled typefaces, from the packages that carry them (SIL Open Font License):
 * Literata (optical size and weight axes) for sentences and questions, Public Sans (weight axis) for figures and controls.
 * Latin is preloaded and used when it is there in time for the first paint (the browser waits a moment for it), so that no line breaks anew;
 * extended Latin loads only when a page needs a letter from it (unicode ranges as published with the files).
 */
import localFont from 'next/font/local';

export const literata = localFont({
  src: [
    {
      path: '../node_modules/@fontsource-variable/literata/files/literata-latin-opsz-normal.woff2',
      weight: '200 900',
      style: 'normal',
    },
    {
      path: '../node_modules/@fontsource-variable/literata/files/literata-latin-opsz-italic.woff2',
      weight: '200 900',
      style: 'italic',
    },
  ],
  variable: '--font-literata',
  adjustFontFallback: 'Times New Roman',
  display: 'optional',
});

export const literataExtended = localFont({
  src: [
    {
      path: '../node_modules/@fontsource-variable/literata/files/literata-latin-ext-wght-normal.woff2',
      weight: '200 900',
      style: 'normal',
    },
    {
      path: '../node_modules/@fontsource-variable/literata/files/literata-latin-ext-wght-italic.woff2',
      weight: '200 900',
      style: 'italic',
    },
  ],
  variable: '--font-literata-ext',
  preload: false,
  adjustFontFallback: false,
  display: 'optional',
  declarations: [
    {
      prop: 'unicode-range',
      value:
        'U+0100-02BA,U+02BD-02C5,U+02C7-02CC,U+02CE-02D7,U+02DD-02FF,U+0304,U+0308,U+0329,U+1D00-1DBF,U+1E00-1E9F,U+1EF2-1EFF,U+2020,U+20A0-20AB,U+20AD-20C0,U+2113,U+2C60-2C7F,U+A720-A7FF',
    },
  ],
});

export const publicSans = localFont({
  src: [
    {
      path: '../node_modules/@fontsource-variable/public-sans/files/public-sans-latin-wght-normal.woff2',
      weight: '100 900',
      style: 'normal',
    },
  ],
  variable: '--font-public-sans',
  adjustFontFallback: 'Arial',
  display: 'optional',
});

export const publicSansExtended = localFont({
  src: [
    {
      path: '../node_modules/@fontsource-variable/public-sans/files/public-sans-latin-ext-wght-normal.woff2',
      weight: '100 900',
      style: 'normal',
    },
  ],
  variable: '--font-public-sans-ext',
  preload: false,
  adjustFontFallback: false,
  display: 'optional',
  declarations: [
    {
      prop: 'unicode-range',
      value:
        'U+0100-02BA,U+02BD-02C5,U+02C7-02CC,U+02CE-02D7,U+02DD-02FF,U+0304,U+0308,U+0329,U+1D00-1DBF,U+1E00-1E9F,U+1EF2-1EFF,U+2020,U+20A0-20AB,U+20AD-20C0,U+2113,U+2C60-2C7F,U+A720-A7FF',
    },
  ],
});
