import { useQuery } from '@tanstack/react-query';
import type { BenchVerdict, OpenedStone } from '@shared/api/bench';
import type { Attribute, SpeciesSummary } from '@shared/api/evidence';
import { stale, useApi } from '@/components/api';
import { Card } from '@/components/ui';
import { RiSgPlot } from '@/components/ui/RiSgPlot';

const mostSpecies = 3;

/** Refractive index against specific gravity: the record, what was read, and the ranges of the likeliest species. Nothing without an index or SG. */
export function RecordPicture({ opened, verdict }: { opened: OpenedStone; verdict: BenchVerdict }) {
  const api = useApi();
  const table = useQuery({
    queryKey: ['species'],
    queryFn: ({ signal }) => api.get<SpeciesSummary[]>('/species', { signal }),
    staleTime: stale.settled,
  });
  const recordedRi = recorded(opened, ['ri_spot', 'ri_high', 'ri_low']);
  const recordedSg = recorded(opened, ['sg']);
  const record = { ...recordedRi && { ri: recordedRi }, ...recordedSg && { sg: recordedSg } };
  const nowRi = read(verdict, ['ri_spot', 'ri_high', 'ri_low']);
  const nowSg = read(verdict, ['sg']);
  const now = { ...nowRi && { ri: nowRi }, ...nowSg && { sg: nowSg } };
  if (Object.keys(record).length === 0 && Object.keys(now).length === 0) return null;
  const ids = [opened.species, ...verdict.result.alternatives.map((alternative) => alternative.species)];
  const species = [...new Set(ids)].slice(0, mostSpecies).flatMap((id) => {
    const row = table.data?.find((one) => one.id === id);
    return row ? [{ name: row.name, ri: [row.riLow, row.riHigh] as [number, number], sg: row.sg }] : [];
  });
  return (
    <Card title="Index and density">
      <RiSgPlot record={record} reading={now} species={species} />
    </Card>
  );
}

interface Measured { value: number; u: number }

function recorded(opened: OpenedStone, attributes: readonly Attribute[]): Measured | undefined {
  for (const { attribute, value } of opened.record) {
    if (attributes.includes(attribute) && typeof value === 'object' && value.value !== 'over_limit' && 'u' in value) return { value: value.value, u: value.u };
  }
  return undefined;
}

function read(verdict: BenchVerdict, attributes: readonly Attribute[]): Measured | undefined {
  const found = verdict.result.contributions.find((one) => attributes.includes(one.attribute) && typeof one.value === 'number');
  return found && typeof found.value === 'number' ? { value: found.value, u: found.u ?? 0 } : undefined;
}
