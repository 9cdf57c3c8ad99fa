import { Curves } from '../../../_components/curves';

export default async function CurvesPage({ params }: { readonly params: Promise<{ projectId: string }> }) {
  return <Curves projectId={(await params).projectId} />;
}
