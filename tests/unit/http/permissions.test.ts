import { may, permissions, roles } from '@shared/permissions';

describe('permissions', () => {
  it('give nothing to somebody without a role', () => {
    for (const permission of Object.keys(permissions) as (keyof typeof permissions)[]) expect(may([], permission)).toBe(false);
  });

  it('keep everything that names a stone, takes a reading or moves money from students', () => {
    for (const permission of ['kit:read', 'stone:read', 'reading:write', 'bench:read', 'bench:write', 'settle:write', 'money:read', 'custody:read', 'people:write', 'verdict:trial'] as const) {
      expect(may(['student'], permission)).toBe(false);
    }
  });

  it('leave keeping money to admins and reading at the bench to instructors, whoever else they are', () => {
    expect(may(['instructor'], 'settle:write')).toBe(false);
    expect(may(['admin'], 'settle:write')).toBe(true);
    expect(may(['admin'], 'bench:write')).toBe(false);
    expect(may(['admin', 'instructor'], 'bench:write')).toBe(true);
  });

  it('let everybody borrow', () => {
    for (const role of roles) expect(may([role], 'loan:own')).toBe(true);
  });
});
