import { affineAt, AT_POLE1, AT_POLE2 } from "../solver/operator";

/**
 * Response of both poles to a sense row over a piece without ramps, from rest: [one, two] into `response` at `at`.
 * @param o operator of the piece, which holds the poles' responses to each state
 * @param row where the row starts in `sense`
 * @param passes false where the rectifier cuts the input off
 */
export function steadyResponse(response: Float64Array, x: Float64Array, sense: Float64Array, o: Float64Array, row: number, at: number, passes: boolean): void {
  if (!passes) {
    response[at] = 0;
    response[at + 1] = 0;
    return;
  }
  const r0 = sense[row]!;
  const r1 = sense[row + 1]!;
  const r2 = sense[row + 2]!;
  const rc = sense[row + 3]!;
  let one = rc * (1 - o[36]!);
  let two = rc * o[39]!;
  if (r0 !== 0) {
    one += r0 * affineAt(o, AT_POLE1, x);
    two += r0 * affineAt(o, AT_POLE2, x);
  }
  if (r1 !== 0) {
    one += r1 * affineAt(o, AT_POLE1 + 4, x);
    two += r1 * affineAt(o, AT_POLE2 + 4, x);
  }
  if (r2 !== 0) {
    one += r2 * affineAt(o, AT_POLE1 + 8, x);
    two += r2 * affineAt(o, AT_POLE2 + 8, x);
  }
  response[at] = one;
  response[at + 1] = two;
}
