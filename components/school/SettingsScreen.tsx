import { useSchoolQuery } from '@/components/api';
import { RequireRole } from '@/components/shell';
import { Card, Failed, Loading, PageFrame, Stack } from '@/components/ui';
import { SchoolForm } from './SchoolForm';
import { TermsCard } from './TermsCard';

/** The school's lending rules and its terms. */
export function SettingsScreen() {
  const school = useSchoolQuery();
  return (
    <RequireRole roles={['admin']}>
      <PageFrame title={school.data?.name ?? 'Settings'} documentTitle="Settings" lead="Changes hold for loans that begin from now on.">
        {school.isPending ? <Loading label="Fetching the settings" /> : null}
        {school.isError ? <Failed error={school.error} onRetry={() => void school.refetch()} /> : null}
        {school.data ? (
          <Stack gap="lg">
            <Card title="Lending">
              <SchoolForm key={JSON.stringify(school.data)} school={school.data} />
            </Card>
            <TermsCard />
          </Stack>
        ) : null}
      </PageFrame>
    </RequireRole>
  );
}
