import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { space, useBreakpoints, useTheme } from '@/components/theme';
import { LinkBox, type To } from './Link';
import { Text } from './Text';

export interface Column<Row> {
  key: string;
  header: string;
  /** A string is set as text; a node is shown as it is. */
  cell: (row: Row) => ReactNode;
  align?: 'left' | 'right';
  /** Not shown on a phone. */
  wideOnly?: boolean;
}

export interface DataTableProps<Row> {
  /** Read before the table; shown when `captionShown`. */
  caption: string;
  captionShown?: boolean;
  /** The first column names the row; on a phone it is the row's title. */
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  /** Where the row's name leads. */
  rowTo?: (row: Row) => To | null;
  chosenKey?: string;
  empty?: ReactNode;
}

/**
 * Rows of data: a table from 700 px on, a list of cards on a phone.
 * @example <DataTable caption="Loans" rows={loans} rowKey={(l) => l.id} rowTo={(l) => `/loans/${l.id}`}
 *   columns={[{ key: 'kit', header: 'Kit', cell: (l) => l.kitNumber }, { key: 'due', header: 'Due', cell: (l) => day(l.dueAt) }]} />
 */
export function DataTable<Row>(props: DataTableProps<Row>) {
  const { phone } = useBreakpoints();
  if (props.rows.length === 0 && props.empty) return <>{props.empty}</>;
  return phone ? <PhoneRows {...props} /> : <WideTable {...props} />;
}

function WideTable<Row>({ caption, captionShown, columns, rows, rowKey, rowTo, chosenKey }: DataTableProps<Row>) {
  const t = useTheme();
  const line = `1px solid ${t.colors.rule}`;
  return (
    <View style={[t.atoms.sheet, styles.sheet]}>
      <table style={{ borderCollapse: 'collapse', width: '100%' }}>
        <caption style={captionShown ? { textAlign: 'left', padding: space.md } : hiddenCaption}>
          <Text strong>{caption}</Text>
        </caption>
        <thead>
          <tr>
            {columns.map((column) => (
              <th key={column.key} scope="col" style={{ ...cell, textAlign: column.align ?? 'left', borderBottom: line }}>
                <Text size="quiet" tone="soft" strong>
                  {column.header}
                </Text>
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, index) => {
            const key = rowKey(row);
            const last = index === rows.length - 1;
            return (
              <tr key={key} style={{ borderBottom: last ? 'none' : line, backgroundColor: key === chosenKey ? t.colors.actionGround : 'transparent' }}>
                {columns.map((column, at) => {
                  const Tag = at === 0 ? 'th' : 'td';
                  return (
                    <Tag key={column.key} {...(at === 0 ? { scope: 'row' as const } : {})} style={{ ...cell, fontWeight: 'normal', textAlign: column.align ?? 'left' }}>
                      <CellLink to={at === 0 ? (rowTo?.(row) ?? null) : null} right={column.align === 'right'}>
                        <CellFace value={column.cell(row)} strong={at === 0} />
                      </CellLink>
                    </Tag>
                  );
                })}
              </tr>
            );
          })}
        </tbody>
      </table>
    </View>
  );
}

function PhoneRows<Row>({ caption, captionShown, columns, rows, rowKey, rowTo, chosenKey }: DataTableProps<Row>) {
  const t = useTheme();
  const [name, ...others] = columns.filter((column) => !column.wideOnly);
  if (!name) return null;
  return (
    <View style={{ gap: space.sm }}>
      {captionShown ? <Text strong>{caption}</Text> : null}
      <View role="list" aria-label={caption} style={[t.atoms.sheet, styles.sheet]}>
        {rows.map((row, index) => (
          <View key={rowKey(row)} role="listitem" style={[styles.phoneRow, index < rows.length - 1 && t.atoms.ruleBottom, rowKey(row) === chosenKey && t.atoms.chosen]}>
            <CellLink to={rowTo?.(row) ?? null} right={false}>
              <CellFace value={name.cell(row)} strong />
            </CellLink>
            {others.map((column) => (
              <View key={column.key} style={styles.phonePair}>
                <Text size="quiet" tone="soft">
                  {column.header}
                </Text>
                <View style={styles.phoneValue}>
                  <CellFace value={column.cell(row)} />
                </View>
              </View>
            ))}
          </View>
        ))}
      </View>
    </View>
  );
}

function CellLink({ to, right, children }: { to: To | null; right: boolean; children: ReactNode }) {
  if (to === null) return <View style={right ? styles.right : styles.left}>{children}</View>;
  return (
    <LinkBox to={to} style={styles.link}>
      {children}
    </LinkBox>
  );
}

function CellFace({ value, strong = false }: { value: ReactNode; strong?: boolean }) {
  return typeof value === 'string' || typeof value === 'number' ? <Text strong={strong}>{value}</Text> : value;
}

const cell = { padding: '9px 12px', verticalAlign: 'middle' } as const;
const hiddenCaption = { position: 'absolute', width: 1, height: 1, overflow: 'hidden', clipPath: 'inset(50%)' } as const;

const styles = StyleSheet.create({
  sheet: { overflow: 'hidden' },
  left: { alignItems: 'flex-start' },
  right: { alignItems: 'flex-end' },
  link: { justifyContent: 'center', alignSelf: 'flex-start' },
  phoneRow: { paddingHorizontal: space.side, paddingVertical: space.md, gap: space.xs },
  phonePair: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', gap: space.md },
  phoneValue: { flexShrink: 1, alignItems: 'flex-end' },
});
