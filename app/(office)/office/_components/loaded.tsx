'use client';
import type { ReactNode } from 'react';
import { Notice } from '@/components/ui/notice';

type Props<T> = { readonly of: { readonly data: T | undefined; readonly error: Error | undefined }; readonly what: string; readonly children: (data: T) => ReactNode };

/** Data, or in words why there is none yet. */
export function Loaded<T>({ of: { data, error }, what, children }: Props<T>) {
  if (error) return <Notice tone="halt" icon="hazard" live="alert" title={`${what} cannot be shown`}>{error.message}</Notice>;
  if (data === undefined) return <p role="status" className="py-6 text-ink-soft">Fetching {what.toLowerCase()} …</p>;
  return <>{children(data)}</>;
}
