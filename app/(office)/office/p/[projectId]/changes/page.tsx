import { ChangeLog } from '../../../_components/change-log';

export default async function ChangesPage({ params }: { readonly params: Promise<{ projectId: string }> }) {
  return <ChangeLog projectId={(await params).projectId} />;
}
