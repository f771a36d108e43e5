/** The sheet of the reversal chart and its margins, in px of its drawing. */
export const BOX = { width: 970, height: 900, left: 54, right: 36, top: 30, bottom: 50 } as const;
