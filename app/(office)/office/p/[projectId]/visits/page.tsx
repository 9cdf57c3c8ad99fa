import { VisitList } from '../../../_components/visit-list';

export default async function VisitsPage({ params }: { readonly params: Promise<{ projectId: string }> }) {
  return <VisitList projectId={(await params).projectId} />;
}
