import { PageHeader } from '../../components/PageHeader';
import { PasswordSection } from './PasswordSection';
import { ProfileSection } from './ProfileSection';
import { SessionsSection } from './SessionsSection';
import { TokensSection } from './TokensSection';

/** One's own name, password, tokens and sessions. */
export function AccountPage() {
  return (
    <>
      <PageHeader title="Account" />
      <ProfileSection />
      <PasswordSection />
      <TokensSection />
      <SessionsSection />
    </>
  );
}
