import { PageHeader } from '../../components/PageHeader';

export function RunPage() {
  return <PageHeader title="Run" />;
}
