/** Colours of a drawing. The page's own come from its CSS variables; these tables serve exports and places without a style sheet. */
export type ThemeColors = {
  paper: string;
  sheet: string;
  sunk: string;
  ink: string;
  ink2: string;
  ink3: string;
  rule: string;
  edge: string;
  fwd: string;
  fwdFill: string;
  fwdTint: string;
  rev: string;
  revFill: string;
  revTint: string;
  ref: string;
  refTint: string;
  fault: string;
  faultTint: string;
  caution: string;
  cautionTint: string;
  onInk: string;
};
export type ColorName = keyof ThemeColors;
export type ThemeName = "light" | "dark";

export const THEMES: Record<ThemeName, ThemeColors> = {
  light: {
    paper: "#F7F2E6",
    sheet: "#FCF9F1",
    sunk: "#E9E1CE",
    ink: "#13242E",
    ink2: "#3D4C55",
    ink3: "#566169",
    rule: "#D5CBB4",
    edge: "#857A60",
    fwd: "#A63F08",
    fwdFill: "#E3A277",
    fwdTint: "#F6DFCB",
    rev: "#07505F",
    revFill: "#7FB5BC",
    revTint: "#D3E5E3",
    ref: "#80459C",
    refTint: "#EADFEE",
    fault: "#96132F",
    faultTint: "#F7DCDC",
    caution: "#6E4E00",
    cautionTint: "#F5E7BF",
    onInk: "#FBF7EC",
  },
  dark: {
    paper: "#111D24",
    sheet: "#17252D",
    sunk: "#0B141A",
    ink: "#F0E8D6",
    ink2: "#C3C1B5",
    ink3: "#98A2A3",
    rule: "#2A3A43",
    edge: "#6F7F86",
    fwd: "#F2A36B",
    fwdFill: "#A9602F",
    fwdTint: "#33271F",
    rev: "#79C4D2",
    revFill: "#2F7787",
    revTint: "#15323B",
    ref: "#BE90DC",
    refTint: "#2E2539",
    fault: "#FF9AA0",
    faultTint: "#40202A",
    caution: "#E6C468",
    cautionTint: "#372F18",
    onInk: "#111D24",
  },
};

const COLOR_NAMES = Object.keys(THEMES.light) as ColorName[];
const variableOf = (name: ColorName) => "--" + name.replace(/[A-Z]/g, (letter) => "-" + letter.toLowerCase());

/** The colours in force at an element; a variable that is not set falls back to the named theme. */
export function readTheme(element: Element, fallback: ThemeName): ThemeColors {
  const style = getComputedStyle(element);
  const colors = { ...THEMES[fallback] };
  for (const name of COLOR_NAMES) {
    const value = style.getPropertyValue(variableOf(name)).trim();
    if (value !== "") colors[name] = value;
  }
  return colors;
}
