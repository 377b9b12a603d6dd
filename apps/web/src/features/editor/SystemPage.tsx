import { PageHeader } from '../../components/PageHeader';

export function SystemPage() {
  return <PageHeader title="Spin system" />;
}
