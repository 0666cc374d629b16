import type { AccountMailTemplate, MailData, SchoolMailTemplate } from '../mailData';
import { invitation, passwordReset } from './accountLetters';
import { jarAbsent, objectionMade } from './adminLetters';
import { depositReleased, kitSetAside, secondReadingWanted } from './checkLetters';
import type { LetterContext, SchoolLetterContext } from './context';
import { type Letter, paragraph } from './letter';
import { kitReturned, loanCancelled, loanStarted } from './loanLetters';
import { depositSettled, holdSecured, keepProposed, paymentTooLate } from './moneyLetters';
import { renderHtml } from './renderHtml';
import { renderText } from './renderText';

const schoolLetters: { readonly [T in SchoolMailTemplate]: (data: MailData[T], context: SchoolLetterContext) => Letter } = {
  'invitation': invitation,
  'loan-started': loanStarted,
  'kit-returned': kitReturned,
  'deposit-released': depositReleased,
  'kit-set-aside': kitSetAside,
  'second-reading-wanted': secondReadingWanted,
  'keep-proposed': keepProposed,
  'deposit-settled': depositSettled,
  'payment-too-late': paymentTooLate,
  'hold-secured': holdSecured,
  'loan-cancelled': loanCancelled,
  'jar-absent': jarAbsent,
  'objection-made': objectionMade,
};

const accountLetters: { readonly [T in AccountMailTemplate]: (data: MailData[T], context: LetterContext) => Letter } = {
  'password-reset': passwordReset,
};

export interface ComposedMail {
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

export function composeSchoolMail<T extends SchoolMailTemplate>(template: T, data: MailData[T], context: SchoolLetterContext): ComposedMail {
  return rendered(schoolLetters[template](data, context), context);
}

export function composeAccountMail<T extends AccountMailTemplate>(template: T, data: MailData[T], context: LetterContext): ComposedMail {
  return rendered(accountLetters[template](data, context), context);
}

export function isSchoolTemplate(name: string): name is SchoolMailTemplate {
  return Object.hasOwn(schoolLetters, name);
}

export function isAccountTemplate(name: string): name is AccountMailTemplate {
  return Object.hasOwn(accountLetters, name);
}

function rendered(bare: Letter, { recipientName }: LetterContext): ComposedMail {
  const letter = recipientName ? { ...bare, blocks: [paragraph(`Hello ${recipientName},`), ...bare.blocks] } : bare;
  return { subject: letter.subject, text: renderText(letter), html: renderHtml(letter) };
}
