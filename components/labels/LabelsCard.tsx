import { useState } from 'react';
import type { KitView, LabelRef } from '@shared/api/kits';
import { Button, Card, CodeText, Dialog, Failed, List, ListRow, Mono, Stack, Text, useAnnounce } from '@/components/ui';
import { useIssueLabelsMutation } from './queries';
import { SheetForm } from './SheetForm';

/** The labels of a kit and its jars: the valid codes, new ones, and the sheet to print. */
export function LabelsCard({ kit }: { kit: KitView }) {
  const [open, setOpen] = useState(false);
  const issue = useIssueLabelsMutation();
  const announce = useAnnounce();
  const some = kit.label !== null || kit.stones.some((stone) => stone.label !== null);
  const missing = kit.label === null || kit.stones.some((stone) => stone.standing === 'in_kit' && stone.label === null);
  const make = () =>
    issue.mutate({ kitId: kit.id }, {
      onSuccess: ({ labels, voidedCount }) => {
        setOpen(false);
        announce(`${labels.length} new labels${voidedCount > 0 ? `, ${voidedCount} old ones void` : ''}`);
      },
    });
  return (
    <Stack gap="lg">
      <Card padded={false} title="Labels">
        <List label="Labels">
          <LabelRow name={`Kit ${kit.number}`} label={kit.label} last={kit.stones.length === 0} />
          {kit.stones.map((stone, index) => (
            <LabelRow key={stone.id} name={`Jar ${stone.slot}`} label={stone.label} last={index === kit.stones.length - 1} />
          ))}
        </List>
      </Card>
      {issue.error && !open ? <Failed error={issue.error} /> : null}
      {some ? (
        <Button kind={missing ? 'primary' : 'secondary'} label="Issue new labels" haspopup="dialog" onPress={() => setOpen(true)} />
      ) : (
        <Button label="Issue labels" busy={issue.isPending} onPress={make} />
      )}
      <Dialog open={open} onClose={() => setOpen(false)} title="Issue new labels?" action={<Button label="Issue new labels" busy={issue.isPending} onPress={make} />}>
        <Stack>
          <Text>The kit and every jar get a new code. The old labels become void at once: whoever scans one is told so. Print and stick the new ones before the kit goes out.</Text>
          {issue.error ? <Failed error={issue.error} /> : null}
        </Stack>
      </Dialog>
      {some ? (
        <Card title="Print">
          <SheetForm kitIds={[kit.id]} />
        </Card>
      ) : null}
    </Stack>
  );
}

function LabelRow({ name, label, last }: { name: string; label: LabelRef | null; last: boolean }) {
  return <ListRow inset rule={!last} title={name} after={label ? <CodeText code={label.code} size="quiet" /> : <Mono tone="soft">no label yet</Mono>} />;
}
