import type { MailData, SchoolMailTemplate } from '@/server/mail/mailData';

const loanId = '0b9a4a0e-7d6d-4c58-9c43-6b1d0f6f3a11';
const kit = { kitNumber: '014', neutralTitle: 'six cabochons' };
const sixty = { amountMinor: 6000, currency: 'EUR' };

/** One believable mail of each kind. */
export const samples: MailData = {
  'password-reset': { token: 'reset-token', expiresAt: '2026-12-01T12:30:00Z' },
  'invitation': { token: 'inv-token', expiresAt: '2026-12-15T17:00:00Z', roles: ['student', 'instructor'], inviterName: 'Ada Quill', inviteeName: 'Ida Marl' },
  'loan-started': {
    loanId, kit, dueAt: '2026-12-04T17:00:00Z', deposit: { ...sixty, mode: 'hold' },
    stones: [{ slot: 'A', neutralDescription: 'pale blue oval, 8×6' }, { slot: 'B', neutralDescription: 'red round, 6' }],
  },
  'kit-returned': { loanId, kit, returnedAt: '2026-12-03T15:12:00Z', missingSlots: ['D'], damagedSlots: ['B', 'A'] },
  'deposit-released': { loanId, kit, deposit: { ...sixty, mode: 'hold' } },
  'kit-set-aside': { loanId, kit, slots: ['C'], deposit: sixty },
  'second-reading-wanted': { loanId, kit, slots: ['C', 'A', 'E'] },
  'keep-proposed': {
    loanId, kit, kept: { ...sixty, amountMinor: 2500 }, released: { ...sixty, amountMinor: 3500 }, objectBy: '2026-12-18T17:00:00Z',
    items: [{ slot: 'C', stone: 'topaz, 8×6 oval', reason: 'Two readers found glass in its jar.', amountMinor: 2500, currency: 'EUR' }],
  },
  'deposit-settled': {
    loanId, kit, kept: { ...sixty, amountMinor: 2500 }, released: { ...sixty, amountMinor: 3500 }, objectBy: '2026-12-18T17:00:00Z',
    items: [{ slot: 'C', stone: 'topaz, 8×6 oval', reason: 'Two readers found glass in its jar.', amountMinor: 2500, currency: 'EUR' }],
  },
  'payment-too-late': { loanId, kit, deposit: { ...sixty, mode: 'hold' } },
  'hold-secured': { loanId, kit, deposit: sixty },
  'jar-absent': { loanId, kit, slots: ['F'] },
  'objection-made': { loanId, kit },
  'loan-cancelled': { loanId, kit, reason: 'jar_absent', absentSlots: ['F'] },
};

export const schoolTemplates = (Object.keys(samples) as (keyof MailData)[]).filter((name): name is SchoolMailTemplate => name !== 'password-reset');
