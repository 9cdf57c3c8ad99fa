/** The field's own addresses; all are the same page. */
export type FieldRoute =
  | { readonly name: 'start' }
  | { readonly name: 'projects' }
  | { readonly name: 'project'; readonly projectId: string }
  | { readonly name: 'sync'; readonly projectId: string }
  | { readonly name: 'plot'; readonly projectId: string; readonly plotId: string }
  | { readonly name: 'visit'; readonly projectId: string; readonly plotId: string; readonly visitId: string }
  | { readonly name: 'finish'; readonly projectId: string; readonly plotId: string; readonly visitId: string }
  | { readonly name: 'unknown' };

/** Reads a path; anything below /field that is none of ours is `unknown`. */
export function parsePath(path: string): FieldRoute {
  const [root, ...parts] = path.split('/').filter(Boolean);
  if (root !== 'field') return { name: 'unknown' };
  if (parts.length === 0) return { name: 'start' };
  if (parts.length === 1 && parts[0] === 'projects') return { name: 'projects' };
  const [p, projectId, section, plotId, visit, visitId, ending, ...rest] = parts;
  if (p !== 'p' || !projectId || rest.length > 0) return { name: 'unknown' };
  if (section === undefined) return { name: 'project', projectId };
  if (section === 'sync' && plotId === undefined) return { name: 'sync', projectId };
  if (section !== 'plot' || !plotId) return { name: 'unknown' };
  if (visit === undefined) return { name: 'plot', projectId, plotId };
  if (visit !== 'visit' || !visitId) return { name: 'unknown' };
  if (ending === undefined) return { name: 'visit', projectId, plotId, visitId };
  return ending === 'finish' ? { name: 'finish', projectId, plotId, visitId } : { name: 'unknown' };
}

/** The path of a route. */
export function pathOf(route: FieldRoute): string {
  switch (route.name) {
    case 'start':
    case 'unknown':
      return '/field';
    case 'projects':
      return '/field/projects';
    case 'project':
      return `/field/p/${route.projectId}`;
    case 'sync':
      return `/field/p/${route.projectId}/sync`;
    case 'plot':
      return `/field/p/${route.projectId}/plot/${route.plotId}`;
    case 'visit':
      return `/field/p/${route.projectId}/plot/${route.plotId}/visit/${route.visitId}`;
    case 'finish':
      return `/field/p/${route.projectId}/plot/${route.plotId}/visit/${route.visitId}/finish`;
  }
}

/** Where "back" leads: one level up, whatever the history holds. */
export function parentOf(route: FieldRoute): FieldRoute {
  switch (route.name) {
    case 'finish':
      return { ...route, name: 'visit' };
    case 'visit':
      return { name: 'plot', projectId: route.projectId, plotId: route.plotId };
    case 'plot':
    case 'sync':
      return { name: 'project', projectId: route.projectId };
    default:
      return { name: 'projects' };
  }
}
