import { Notice, Link, SelectField, Stack, Text } from '@/components/ui';
import type { InstrumentKind, InstrumentView } from '@shared/api/instruments';
import type { Instruments } from './draft';

const kindWords: Readonly<Record<InstrumentKind, string>> = {
  balance: 'Balance', refractometer: 'Refractometer', caliper: 'Caliper', polariscope: 'Polariscope', uv_lamp: 'UV lamp', thermometer: 'Thermometer',
};

interface InstrumentLineProps {
  kinds: readonly InstrumentKind[];
  register: readonly InstrumentView[];
  chosen: Instruments;
  onChoose: (kind: InstrumentKind, id: string) => void;
}

/** Which instrument each kind of reading is taken with. A choice only where the register has more than one. */
export function InstrumentLine({ kinds, register, chosen, onChoose }: InstrumentLineProps) {
  const usable = (kind: InstrumentKind) => register.filter((instrument) => instrument.kind === kind && !instrument.retired);
  const missing = kinds.filter((kind) => usable(kind).length === 0);
  const single = kinds.filter((kind) => usable(kind).length === 1).map((kind) => usable(kind)[0]?.name);
  return (
    <Stack gap="sm">
      {single.length > 0 ? (
        <Text size="quiet" tone="soft">
          Read with {single.join(', ')}.
        </Text>
      ) : null}
      {kinds.filter((kind) => usable(kind).length > 1).map((kind) => (
        <SelectField
          key={kind}
          label={kindWords[kind]}
          options={usable(kind).map((instrument) => ({ value: instrument.id, label: instrument.name }))}
          value={chosen[kind] ?? ''}
          onChange={(id) => onChoose(kind, id)}
        />
      ))}
      {missing.length > 0 ? (
        <Notice kind="info" title={`No ${missing.map((kind) => kindWords[kind].toLowerCase()).join(' or ')} in the register`}>
          <Text size="quiet">A reading takes its uncertainty from its instrument. Add it first, then read.</Text>
          <Link label="Open the instruments" to="/instruments" size="quiet" />
        </Notice>
      ) : null}
    </Stack>
  );
}
