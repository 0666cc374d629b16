import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import type { BenchStone } from '@shared/api/bench';
import { useSession } from '@/components/api';
import { space } from '@/components/theme';
import { Button, Dialog, Failed, ListRow, Mono, RadioField, Stack, StateBadge, TextField } from '@/components/ui';
import { useBenchJarMutation } from './queries';
import { stoneBadge } from './words';

/** One jar of the check: a link to its stone, and a way to note it as missing or damaged. */
export function JarRow({ loanId, stone, chosen, last }: { loanId: string; stone: BenchStone; chosen: boolean; last: boolean }) {
  const { hasRole } = useSession();
  const mayNote = hasRole('instructor') && stone.ending === null;
  const said = stone.backState !== null && stone.backState !== 'seen' ? `Said at return: ${stone.backState}${stone.backCondition ? `, ${stone.backCondition}` : ''}` : '';
  return (
    <View>
      <ListRow
        inset
        rule={!last}
        chosen={chosen}
        to={`/bench/${loanId}?stone=${stone.stoneId}`}
        before={<Mono strong>{stone.slot}</Mono>}
        title={stone.neutralDescription}
        detail={said || stone.marks || 'no marks noted'}
        after={<StateBadge {...stoneBadge(stone)} />}
      />
      {mayNote && stone.benchState !== 'seen' ? <NoteJar loanId={loanId} stone={stone} /> : null}
    </View>
  );
}

/** Says what the bench finds of a jar that cannot simply be scanned. */
export function NoteJar({ loanId, stone }: { loanId: string; stone: BenchStone }) {
  const [open, setOpen] = useState(false);
  const [state, setState] = useState<'seen' | 'missing' | 'damaged'>('missing');
  const [condition, setCondition] = useState('');
  const jar = useBenchJarMutation(loanId);
  const save = () => jar.mutate({ stoneId: stone.stoneId, state, condition }, { onSuccess: () => setOpen(false) });
  return (
    <View style={styles.note}>
      <Button kind="quiet" label="Missing or damaged?" accessibleLabel={`Note what you find of jar ${stone.slot}`} haspopup="dialog" onPress={() => setOpen(true)} />
      <Dialog open={open} onClose={() => setOpen(false)} title={`Jar ${stone.slot}`} action={<Button label="Save" busy={jar.isPending} onPress={save} />}>
        <Stack gap="lg">
          <RadioField
            label="What do you find?"
            options={[
              { value: 'missing', label: 'Missing', hint: 'no jar, or an empty one' },
              { value: 'damaged', label: 'Damaged', hint: 'the stone is here, but chipped or broken' },
              { value: 'seen', label: 'Here', hint: 'its label cannot be scanned' },
            ]}
            value={state}
            onChange={setState}
          />
          <TextField label="What can be seen" optional value={condition} onChange={setCondition} lines={2} maxLength={300} />
          {jar.error ? <Failed error={jar.error} /> : null}
        </Stack>
      </Dialog>
    </View>
  );
}

const styles = StyleSheet.create({
  note: { alignItems: 'flex-end', paddingHorizontal: space.side },
});
