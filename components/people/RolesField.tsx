import type { Role } from '@shared/api/common';
import { CheckboxField, Stack, Text } from '@/components/ui';

const roles: readonly { value: Role; label: string; hint: string }[] = [
  { value: 'student', label: 'Student', hint: 'borrows kits' },
  { value: 'instructor', label: 'Instructor', hint: 'keeps the records and reads returned stones' },
  { value: 'admin', label: 'Admin', hint: 'runs the desk, the money and the people' },
];

export const roleLabel = (role: Role): string => roles.find((one) => one.value === role)?.label ?? role;

/** One person may hold several roles. */
export function RolesField({ value, onChange, error }: { value: readonly Role[]; onChange: (roles: Role[]) => void; error?: string | undefined }) {
  return (
    <Stack gap="xs" role="group" aria-label="Roles">
      <Text strong>Roles</Text>
      {roles.map((role) => (
        <CheckboxField
          key={role.value}
          label={role.label}
          hint={role.hint}
          checked={value.includes(role.value)}
          onChange={(on) => onChange(on ? [...value, role.value] : value.filter((one) => one !== role.value))}
        />
      ))}
      {error ? <Text size="quiet" tone="different" role="alert">{error}</Text> : null}
    </Stack>
  );
}
