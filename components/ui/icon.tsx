const paths = {
  back: 'M15 4 7 12l8 8',
  /** A second look: an eye over a tick mark. */
  doubt: 'M12 3 2.5 20h19L12 3Zm0 6v5m0 3v.5',
  check: 'M4 13l5 5L20 6',
  erase: 'M9 5h12v14H9l-6-7 6-7Zm3 4 6 6m0-6-6 6',
  swap: 'M4 8h14l-4-4M20 16H6l4 4',
  undo: 'M9 5 4 10l5 5M4 10h10a6 6 0 0 1 0 12h-3',
  next: 'M5 12h14m-6-6 6 6-6 6',
  again: 'M4 12a8 8 0 1 1 2.3 5.7M4 20v-5h5',
  hazard: 'M12 3 2.5 20h19L12 3Zm0 6v5m0 3v.5',
  leaf: 'M5 20C4 11 9 4 20 4c0 11-7 16-13 14M5 20c2-5 5-8 10-11',
  way: 'M12 21s-7-6.2-7-11a7 7 0 0 1 14 0c0 4.800-7 11-7 11Zm0-8.500a2.500 2.500 0 1 0 0-5 2.500 2.500 0 0 0 0 5Z',
  sync: 'M4 9a8 8 0 0 1 14-3l2 2M20 4v4h-4M20 15a8 8 0 0 1-14 3l-2-2M4 20v-4h4',
  theme: 'M20 14.500A8 8 0 0 1 9.500 4 8 8 0 1 0 20 14.500Z',
  list: 'M4 6h16M4 12h16M4 18h16',
  bin: 'M5 7h14M10 7V4h4v3m-7 0 1 13h8l1-13',
  phone: 'M7 3h10v18H7zM11 18h2',
} as const;

export type IconName = keyof typeof paths;

/** A line drawing beside words; never the only bearer of a meaning, so hidden from assistive technology. */
export function Icon({ name, className = 'size-6' }: { readonly name: IconName; readonly className?: string }) {
  return (
    <svg viewBox="0 0 24 24" className={`${className} shrink-0`} fill="none" stroke="currentColor" strokeWidth={2.2} strokeLinecap="round" strokeLinejoin="round" aria-hidden="true" focusable="false">
      <path d={paths[name]} />
    </svg>
  );
}
