import 'server-only';

/** One column of an export and of its dictionary. */
export type Column = {
  readonly name: string;
  readonly meaning: string;
  /** Unit of the numbers, or how a text is written; '' where there is none. */
  readonly unit: string;
  readonly kind: 'text' | 'number' | 'whole';
  /** Words allowed, where there is a fixed list. */
  readonly words?: readonly string[];
};

export type Cell = string | number | null;
export type Row = Readonly<Record<string, Cell>>;
