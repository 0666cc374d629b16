import { BenchSubmission } from '@/server/features/bench/benchSubmission.entity';
import { StoneAcceptance } from '@/server/features/bench/stoneAcceptance.entity';
import { Verdict } from '@/server/features/bench/verdict.entity';
import { CustodyEvent } from '@/server/features/custody/custody.entity';
import { Payment, PaymentStep, WebhookEvent } from '@/server/features/deposits/payment.entity';
import { Instrument } from '@/server/features/instruments/instrument.entity';
import { Kit } from '@/server/features/kits/kit.entity';
import { Label } from '@/server/features/labels/label.entity';
import { Loan, LoanStone } from '@/server/features/loans/loan.entity';
import { Objection } from '@/server/features/loans/objection.entity';
import { Photo } from '@/server/features/photos/photo.entity';
import { School } from '@/server/features/school/school.entity';
import { TermsVersion } from '@/server/features/school/termsVersion.entity';
import { Settlement } from '@/server/features/settlement/settlement.entity';
import { SettlementItem } from '@/server/features/settlement/settlementItem.entity';
import { Reading } from '@/server/features/stones/reading.entity';
import { ReadingStrike } from '@/server/features/stones/readingStrike.entity';
import { Stone } from '@/server/features/stones/stone.entity';
import { LedgerAccount, LedgerPosting, LedgerTransfer } from '@/server/ledger/ledger.entity';

/** Every entity of every feature, named here so that no folder scan decides what the database holds. */
export const entities: (new () => object)[] = [
  BenchSubmission,
  StoneAcceptance,
  Verdict,
  CustodyEvent,
  Instrument,
  Kit,
  Label,
  Photo,
  Settlement,
  SettlementItem,
  Reading,
  ReadingStrike,
  Stone,
  Payment,
  PaymentStep,
  WebhookEvent,
  Loan,
  LoanStone,
  Objection,
  School,
  TermsVersion,
  LedgerAccount,
  LedgerPosting,
  LedgerTransfer,
];
