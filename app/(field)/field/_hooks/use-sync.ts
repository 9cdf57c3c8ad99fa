'use client';
import type { FieldStore, Identity } from '@/lib/client/field-store-types';

export function useSync(_store: FieldStore | null, _identity: Identity | null): (() => Promise<void>) | null {
  return null;
}
