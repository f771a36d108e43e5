import type { ReversalChartData } from "@/lib/explain/reversal-chart";

type Scale = (value: number) => number;
export type Word = { text: string; px: number; py: number; fill: string; sizePx: number; spacing: string };

/** The three words on the water: where the current runs forward, where it stands, where it runs back. Found from the data, so they keep to their side. */
export function placeWords(chart: ReversalChartData, x: Scale, y: Scale): { words: Word[]; slopeDeg: number } {
  const place = (share: number, rowsFromSlack: number) => {
    const column = Math.round(share * (chart.timeS.length - 1));
    const slackRow = chart.currentA.findIndex((values) => values[column]! > 0);
    return { px: x(column), py: y(slackRow + rowsFromSlack) };
  };
  const slack = place(0.74, 1);
  const later = place(0.84, 1);
  const large = { sizePx: 34, spacing: "0.42em" };
  return {
    slopeDeg: (Math.atan2(later.py - slack.py, later.px - slack.px) * 180) / Math.PI,
    words: [
      { text: "Forward", ...place(0.7, 11), fill: "var(--fwd)", ...large },
      { text: "slack", ...slack, fill: "var(--ink)", sizePx: 17, spacing: "0.2em" },
      { text: "Reverse", ...place(0.74, -15), fill: "var(--rev)", ...large },
    ],
  };
}

/** Whether a small figure at a place would run into a word. */
export const isNearWord = (words: readonly Word[], px: number, py: number): boolean =>
  words.some((word) => Math.abs(px - word.px) < word.sizePx * 3.4 && Math.abs(py + 8 - word.py) < word.sizePx * 1.1);

export function ChartWords({ words, slopeDeg }: ReturnType<typeof placeWords>) {
  return words.map(({ text, px, py, fill, sizePx, spacing }) => (
    <text key={text} transform={`translate(${px.toFixed(1)} ${py.toFixed(1)}) rotate(${slopeDeg.toFixed(1)})`} textAnchor="middle" fill={fill} className="chart-halo" style={{ font: `italic 400 ${sizePx}px var(--serif)`, letterSpacing: spacing }}>
      {text}
    </text>
  ));
}
