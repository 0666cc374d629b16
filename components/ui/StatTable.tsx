import { useTheme } from '@/components/theme';
import { Mono, Text } from './Text';

/** A small table of texts and numbers, as the other face of a picture. The first column names the rows. */
export function StatTable({ caption, head, rows }: { caption: string; head: readonly string[]; rows: readonly (readonly string[])[] }) {
  const { colors } = useTheme();
  const line = { borderBottom: `1px solid ${colors.rule}`, padding: '7px 8px 7px 0', textAlign: 'left' } as const;
  return (
    <table style={{ borderCollapse: 'collapse', width: '100%' }}>
      <caption style={{ textAlign: 'left', paddingBottom: 4 }}>
        <Text size="quiet" tone="soft">
          {caption}
        </Text>
      </caption>
      <thead>
        <tr>
          {head.map((words, index) => (
            <th key={words || index} scope="col" style={line}>
              <Text size="quiet" tone="soft">
                {words}
              </Text>
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map(([name, ...cells]) => (
          <tr key={name}>
            <th scope="row" style={line}>
              <Text size="quiet" strong>
                {name}
              </Text>
            </th>
            {cells.map((cell, index) => (
              <td key={head[index + 1] ?? index} style={line}>
                <Mono size="quiet">{cell}</Mono>
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
