import { Column, Entity, PrimaryColumn } from 'typeorm';
import { minorUnits } from '@/server/database/transformers';
import type { AccountKind, TransferKind } from '@shared/money';

@Entity('ledger_account')
export class LedgerAccount {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'text' })
  kind: AccountKind;

  @Column({ type: 'char', length: 3 })
  currency: string;
}

/** Append-only: one movement of money, whose postings sum to zero. */
@Entity('ledger_transfer')
export class LedgerTransfer {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'bigint', insert: false, update: false })
  seq: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'loan_id', nullable: true })
  loanId: string | null;

  @Column({ type: 'uuid', name: 'payment_id', nullable: true })
  paymentId: string | null;

  @Column({ type: 'text' })
  kind: TransferKind;

  /** Unique in the school: the same movement is posted once however often it is tried. */
  @Column({ type: 'text' })
  key: string;

  @Column({ type: 'uuid', name: 'reverses_transfer_id', nullable: true })
  reversesTransferId: string | null;

  @Column({ type: 'text', default: '' })
  memo: string;

  @Column({ type: 'timestamptz' })
  at: Date;
}

/** Append-only: one line of a transfer. Debit is positive, credit negative. */
@Entity('ledger_posting')
export class LedgerPosting {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'transfer_id' })
  transferId: string;

  @Column({ type: 'uuid', name: 'account_id' })
  accountId: string;

  @Column({ type: 'bigint', name: 'amount_minor', transformer: minorUnits })
  amountMinor: number;

  @Column({ type: 'char', length: 3 })
  currency: string;
}
