import { TreeTable } from '../../../_components/tree-table';

export default async function TreesPage({ params }: { readonly params: Promise<{ projectId: string }> }) {
  return <TreeTable projectId={(await params).projectId} />;
}
