import { fitWindow, panWindow, revealTime, zoomWindow, type PlotWindow } from "./scale";
import { stepFrom, type StepKind, type StepStops } from "./steps";

/** What a key or a button asks of the run. */
export type RunCommand =
  | { do: "step"; kind: StepKind; direction: 1 | -1 }
  | { do: "goTo"; place: "start" | "end" }
  | { do: "zoom"; factor: number }
  | { do: "pan"; direction: 1 | -1 }
  | { do: "whole" }
  | { do: "period" }
  | { do: "span" }
  | { do: "pin" }
  | { do: "unpin" }
  | { do: "play" };

export type KeyStroke = { key: string; shiftKey: boolean; ctrlKey: boolean; altKey: boolean; metaKey: boolean };

const LETTERS: Record<string, RunCommand> = {
  "[": { do: "step", kind: "milestone", direction: -1 },
  "]": { do: "step", kind: "milestone", direction: 1 },
  ",": { do: "step", kind: "sample", direction: -1 },
  ".": { do: "step", kind: "sample", direction: 1 },
  "+": { do: "zoom", factor: 0.5 },
  "=": { do: "zoom", factor: 0.5 },
  "-": { do: "zoom", factor: 2 },
  "0": { do: "whole" },
  z: { do: "period" },
  p: { do: "pin" },
};

/**
 * The command of a key while the run region has focus. Single characters act only with `areLettersOn` (WCAG 2.1.4 asks that they can be
 * switched off); arrows, Home, End and Space always do. Ctrl with an arrow moves the window instead of the cursor.
 */
export function commandOfKey(stroke: KeyStroke, areLettersOn: boolean): RunCommand | null {
  const { key, shiftKey, ctrlKey } = stroke;
  if (stroke.altKey || stroke.metaKey) return null;
  if (key === "ArrowLeft" || key === "ArrowRight") {
    const direction = key === "ArrowRight" ? 1 : -1;
    if (ctrlKey) return { do: "pan", direction };
    return { do: "step", kind: shiftKey ? "period" : "event", direction };
  }
  if (ctrlKey) return null;
  if (key === "Home") return { do: "goTo", place: "start" };
  if (key === "End") return { do: "goTo", place: "end" };
  if (key === " ") return { do: "play" };
  if (!areLettersOn) return null;
  if (key.toLowerCase() === "p" && shiftKey) return { do: "unpin" };
  return LETTERS[key.length === 1 ? key.toLowerCase() : key] ?? null;
}

export type RunPlace = { cursorS: number; window: PlotWindow; pinS: number | null };

const PAN_SHARE = 0.25;

/** The place after a command; the window follows the cursor only as far as needed to show it. `play` is the caller's. */
export function applyCommand(place: RunPlace, command: RunCommand, stops: StepStops): RunPlace {
  const { cursorS, window, pinS } = place;
  const { durationS, periodS } = stops;
  const moveTo = (timeS: number): RunPlace => ({ ...place, cursorS: timeS, window: revealTime(window, timeS, durationS) });
  const look = (next: PlotWindow): RunPlace => ({ ...place, window: next });
  switch (command.do) {
    case "step":
      return moveTo(stepFrom(cursorS, command.kind, command.direction, stops));
    case "goTo":
      return moveTo(command.place === "start" ? 0 : durationS);
    case "zoom":
      return look(zoomWindow(window, command.factor, aboutOf(place), durationS, periodS));
    case "pan":
      return look(panWindow(window, command.direction * PAN_SHARE * (window.toS - window.fromS), durationS));
    case "whole":
      return look({ fromS: 0, toS: durationS });
    case "period":
      return look(periodWindow(cursorS, periodS, durationS));
    case "span":
      return pinS === null ? place : look(spanWindow(pinS, cursorS, durationS, periodS));
    case "pin":
      return { ...place, pinS: cursorS };
    case "unpin":
      return { ...place, pinS: null };
    case "play":
      return place;
  }
}

/** Zooming keeps the cursor in place when it is visible, else the middle. */
const aboutOf = ({ cursorS, window }: RunPlace): number => (cursorS >= window.fromS && cursorS <= window.toS ? cursorS : (window.fromS + window.toS) / 2);

/** The PWM period of the cursor with a tenth of a period on either side. */
function periodWindow(cursorS: number, periodS: number, durationS: number): PlotWindow {
  const index = Math.min(Math.floor(cursorS / periodS + 1e-9), Math.max(0, Math.ceil(durationS / periodS - 1e-9) - 1));
  return fitWindow({ fromS: (index - 0.1) * periodS, toS: (index + 1.1) * periodS }, durationS, periodS);
}

function spanWindow(oneS: number, otherS: number, durationS: number, periodS: number): PlotWindow {
  const fromS = Math.min(oneS, otherS);
  const toS = Math.max(oneS, otherS);
  const marginS = (toS - fromS) * 0.05;
  return toS > fromS ? fitWindow({ fromS: fromS - marginS, toS: toS + marginS }, durationS, periodS) : { fromS, toS: fromS + periodS };
}
