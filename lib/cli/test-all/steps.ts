/** A step of `npm test`, in the order in which they run: cheap ones first. */
export type Step = {
  readonly name: 'types' | 'lint' | 'unit' | 'integration' | 'build' | 'browser';
  readonly does: string;
} & ({ readonly kind: 'script'; readonly script: string } | { readonly kind: 'build' } | { readonly kind: 'vitest'; readonly project: string });

export const steps: readonly Step[] = [
  { name: 'types', does: 'types', kind: 'script', script: 'types' },
  { name: 'lint', does: 'lint', kind: 'script', script: 'lint' },
  { name: 'unit', does: 'unit tests', kind: 'vitest', project: 'unit' },
  { name: 'integration', does: 'integration tests', kind: 'vitest', project: 'integration' },
  { name: 'build', does: 'production build', kind: 'build' },
  { name: 'browser', does: 'browser tests', kind: 'vitest', project: 'browser' },
];

/** The steps that `--only` names, in running order. Result: a message instead when a name is not one. */
export function pickSteps(only: readonly string[]): readonly Step[] | string {
  const names = only.flatMap((list) => list.split(',')).map((name) => name.trim()).filter((name) => name !== '');
  const unknown = names.filter((name) => !steps.some((step) => step.name === name));
  if (unknown.length > 0) return `There is no step ${unknown.join(', ')}. The steps are: ${steps.map(({ name }) => name).join(', ')}.`;
  return names.length === 0 ? steps : steps.filter(({ name }) => names.includes(name));
}
