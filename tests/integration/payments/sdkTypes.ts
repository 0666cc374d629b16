import { readFileSync } from 'node:fs';
import path from 'node:path';

import ts from 'typescript';

/** Where the SDK declares each object. */
const declarations: Readonly<Record<string, readonly [file: string, name: string]>> = {
  'checkout.session': ['Checkout/Sessions', 'Session'],
  payment_intent: ['PaymentIntents', 'PaymentIntent'],
  charge: ['Charges', 'Charge'],
  refund: ['Refunds', 'Refund'],
  customer: ['Customers', 'Customer'],
  event: ['Events', 'EventBase'],
  dispute: ['Disputes', 'Dispute'],
  balance_transaction: ['BalanceTransactions', 'BalanceTransaction'],
  payment_method: ['PaymentMethods', 'PaymentMethod'],
  setup_intent: ['SetupIntents', 'SetupIntent'],
  webhook_endpoint: ['WebhookEndpoints', 'WebhookEndpoint'],
};

/** Which top-level keys of an object may be null, read from the SDK's own declarations. */
export function nullableKeys(objectName: string): Set<string> {
  const [file, name] = declarations[objectName] ?? ['', ''];
  const filePath = path.resolve(__dirname, '../../../node_modules/stripe/cjs/resources', `${file}.d.ts`);
  const source = ts.createSourceFile(filePath, readFileSync(filePath, 'utf8'), ts.ScriptTarget.Latest, true);
  const found = source.statements.find((statement) => ts.isInterfaceDeclaration(statement) && statement.name.text === name);
  if (found === undefined || !ts.isInterfaceDeclaration(found)) throw new Error(`the SDK declares no ${name} in ${file}`);
  const keys = new Set<string>();
  for (const member of found.members) {
    if (!ts.isPropertySignature(member) || member.type === undefined) continue;
    const isNullable = ts.isUnionTypeNode(member.type) && member.type.types.some((part) => part.getText() === 'null');
    if (isNullable) keys.add(member.name.getText());
  }
  return keys;
}
