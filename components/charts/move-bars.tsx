import type { Booked, BookedTo } from '@/lib/domain/turnaround/turnaround';

const PARTS: readonly { key: BookedTo; label: string; fill: string; text: string }[] = [
  { key: 'sender', label: 'our move', fill: 'fill-blue', text: 'fill-on-blue' },
  { key: 'road', label: 'on the road', fill: 'fill-brass-ring', text: 'fill-rail' },
  { key: 'partner', label: 'their move', fill: 'fill-ink-2', text: 'fill-paper' },
  { key: 'snag', label: 'waiting on a snag', fill: 'fill-rule', text: 'fill-ink' },
];

/** Bars of whose move the days went on; the table with the same figures stands below. */
export function MoveBars({ rows }: { rows: readonly { group: string; days: Booked }[] }) {
  const longest = Math.max(
    ...rows.map(({ days }) => PARTS.reduce((all, { key }) => all + days[key], 0)),
    0.1,
  );
  const scale = 900 / longest;
  return (
    <svg
      viewBox={`0 0 1180 ${rows.length * 50 + 36}`}
      className="w-full"
      role="img"
      aria-label="Working days an order, by whose move; the table below has the figures"
    >
      {rows.map(({ group, days }, index) => {
        let x = 250;
        return (
          <g key={group} fontSize="15">
            <text x="0" y={index * 50 + 28} className="fill-ink">
              {group}
            </text>
            {PARTS.map(({ key, fill, text }) => {
              const width = days[key] * scale;
              const start = x;
              x += width;
              return (
                <g key={key}>
                  <rect
                    x={start}
                    y={index * 50 + 6}
                    width={Math.max(0, width - 2)}
                    height="34"
                    className={fill}
                  />
                  {width > 56 && (
                    <text x={start + 8} y={index * 50 + 28} className={`num ${text}`}>
                      {days[key].toFixed(1)} d
                    </text>
                  )}
                </g>
              );
            })}
          </g>
        );
      })}
      {PARTS.map(({ key, label, fill }, index) => (
        <g key={key} fontSize="14">
          <rect x={250 + index * 180} y={rows.length * 50 + 12} width="15" height="15" className={fill} />
          <text x={272 + index * 180} y={rows.length * 50 + 25} className="fill-ink-2">
            {label}
          </text>
        </g>
      ))}
    </svg>
  );
}
