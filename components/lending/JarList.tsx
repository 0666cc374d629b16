import type { LoanView } from '@shared/api/loans';
import { Card, Figure, List, ListRow, Row, Mono } from '@/components/ui';

/** The kit's jars as a borrower knows them: a letter, what anyone can see, a plain dark field. */
export function JarList({ loan }: { loan: LoanView }) {
  return (
    <Card title="Stones" padded={false}>
      <List label="Stones">
        {loan.jars.map((jar, index) => (
          <ListRow
            key={jar.stoneId}
            inset
            rule={index < loan.jars.length - 1}
            before={<Row gap="md"><Figure parameters={null} size={44} /><Mono strong>{jar.slot}</Mono></Row>}
            title={jar.neutralDescription}
            detail={jar.backState && jar.backState !== 'seen' ? `said at return: ${jar.backState}${jar.backCondition ? `, ${jar.backCondition}` : ''}` : jar.outCondition || 'no marks noted'}
          />
        ))}
      </List>
    </Card>
  );
}
