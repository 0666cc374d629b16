import { useId, type KeyboardEvent, type ReactNode } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { size, space, useTheme } from '@/components/theme';
import { Text } from './Text';

export interface TabsProps<Value extends string> {
  label: string;
  value: Value;
  tabs: readonly { value: Value; label: string; count?: number }[];
  onChange: (value: Value) => void;
  /** The chosen view. */
  children: ReactNode;
}

/** Views of one page. One stop of the Tab key; the arrows, Home and End move between the tabs. */
export function Tabs<Value extends string>({ label, value, tabs, onChange, children }: TabsProps<Value>) {
  const t = useTheme();
  const id = useId();

  function move(event: KeyboardEvent) {
    const at = tabs.findIndex((tab) => tab.value === value);
    const to = { ArrowRight: at + 1, ArrowLeft: at - 1, Home: 0, End: tabs.length - 1 }[event.key];
    if (to === undefined) return;
    event.preventDefault();
    const next = tabs[(to + tabs.length) % tabs.length];
    if (!next) return;
    onChange(next.value);
    document.getElementById(`${id}${next.value}`)?.focus();
  }

  return (
    <View style={styles.tabs}>
      <View role="tablist" aria-label={label} onKeyDown={move} style={[styles.bar, t.atoms.ruleBottom]}>
        {tabs.map((tab) => {
          const chosen = tab.value === value;
          return (
            <Pressable
              key={tab.value}
              id={`${id}${tab.value}`}
              role="tab"
              aria-selected={chosen}
              aria-controls={`${id}panel`}
              aria-label={tab.count === undefined ? tab.label : `${tab.label}, ${tab.count}`}
              tabIndex={chosen ? 0 : -1}
              onPress={() => onChange(tab.value)}
              style={[styles.tab, { borderBottomColor: chosen ? t.colors.ink : 'transparent' }]}
            >
              <Text strong={chosen} tone={chosen ? 'ink' : 'soft'}>
                {tab.count === undefined ? tab.label : `${tab.label} ${tab.count}`}
              </Text>
            </Pressable>
          );
        })}
      </View>
      <View role="tabpanel" id={`${id}panel`} aria-labelledby={`${id}${value}`} style={styles.panel}>
        {children}
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  tabs: { gap: space.lg },
  bar: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  tab: { minHeight: size.target, minWidth: size.target, justifyContent: 'center', paddingHorizontal: space.sm, borderBottomWidth: 3 },
  panel: { gap: space.lg },
});
