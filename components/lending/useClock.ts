import { useState } from 'react';
import { useSchoolQuery } from '@/components/api';

/** The school's time zone and the moment this screen was opened; the browser's own zone until the school is known. */
export function useClock(): { timeZone: string; now: Date } {
  const school = useSchoolQuery();
  const [now] = useState(() => new Date());
  return { timeZone: school.data?.timeZone ?? Intl.DateTimeFormat().resolvedOptions().timeZone, now };
}
