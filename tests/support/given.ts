type Given<T> = Exclude<T, { readonly kind: 'refused' }>;

/** The result itself; a refusal fails the test. */
export function given<T extends { readonly kind: string }>(result: T): Given<T> {
  if (result.kind === 'refused') throw new Error(`refused: ${JSON.stringify(result)}`);
  return result as Given<T>;
}
