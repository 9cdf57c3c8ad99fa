import { VisitView } from '../../../../_components/visit-view';

export default async function VisitPage({ params }: { readonly params: Promise<{ projectId: string; visitId: string }> }) {
  const { projectId, visitId } = await params;
  return <VisitView projectId={projectId} visitId={visitId} />;
}
