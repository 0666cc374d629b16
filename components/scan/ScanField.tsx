import { CameraView, useCameraPermissions } from 'expo-camera';
import { useEffect, useRef } from 'react';
import { StyleSheet, View } from 'react-native';
import { space, useTheme } from '@/components/theme';
import { Button, Notice, Stack, Text } from '@/components/ui';

const diameter = 280;

/** The camera as a field of view: round and dark, with four marks to aim by. */
export function ScanField({ onScanned, onClose }: { onScanned: (text: string) => void; onClose: () => void }) {
  const [permission, ask] = useCameraPermissions();
  const { colors } = useTheme();
  // expo-camera keeps the handler of its first render, so the newest one is read through a ref.
  const newest = useRef(onScanned);
  useEffect(() => {
    newest.current = onScanned;
  });
  useEffect(() => {
    if (permission && !permission.granted && permission.canAskAgain) void ask();
  }, [permission, ask]);

  if (permission && !permission.granted && !permission.canAskAgain) return <NoCamera onClose={onClose} />;
  return (
    <Stack gap="md" style={styles.centre}>
      <View style={[styles.field, { backgroundColor: colors.field, borderColor: colors.edge }]} role="img" aria-label="Camera view. Hold the label inside the circle.">
        {permission?.granted ? (
          <CameraView
            style={styles.camera}
            facing="back"
            barcodeScannerSettings={{ barcodeTypes: ['qr'] }}
            onBarcodeScanned={({ data }) => newest.current(data)}
          />
        ) : null}
        <View aria-hidden style={styles.marks}>
          {(['top', 'right', 'bottom', 'left'] as const).map((side) => (
            <View key={side} style={[styles.mark, marks[side], { backgroundColor: colors.onField }]} />
          ))}
        </View>
      </View>
      {permission?.granted ? null : <Text size="quiet" tone="soft" role="status">Waiting for the camera. Your browser may ask whether it may be used.</Text>}
      <Button kind="quiet" label="Close the camera" onPress={onClose} />
    </Stack>
  );
}

function NoCamera({ onClose }: { onClose: () => void }) {
  return (
    <Notice kind="info" title="No camera can be used here">
      <Text size="quiet">Allow it for this site in your browser’s settings (away from this computer it needs an https address), or type the code: it does the same.</Text>
      <Button kind="quiet" label="Type the code instead" onPress={onClose} />
    </Notice>
  );
}

const marks = StyleSheet.create({
  top: { top: 0, left: '50%', width: 2, height: 16, marginLeft: -1 },
  bottom: { bottom: 0, left: '50%', width: 2, height: 16, marginLeft: -1 },
  left: { left: 0, top: '50%', width: 16, height: 2, marginTop: -1 },
  right: { right: 0, top: '50%', width: 16, height: 2, marginTop: -1 },
});

const styles = StyleSheet.create({
  centre: { alignItems: 'center', paddingVertical: space.sm },
  field: { width: diameter, height: diameter, maxWidth: '100%', borderRadius: diameter / 2, borderWidth: 2, overflow: 'hidden' },
  camera: { width: '100%', height: '100%' },
  marks: { position: 'absolute', top: 0, right: 0, bottom: 0, left: 0, pointerEvents: 'none' },
  mark: { position: 'absolute' },
});
