import { Overview } from '../../_components/overview';

export default async function OverviewPage({ params }: { readonly params: Promise<{ projectId: string }> }) {
  return <Overview projectId={(await params).projectId} />;
}
