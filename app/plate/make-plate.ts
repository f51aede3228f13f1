import type { Report } from '../../core/report/report';
import type { Palette } from '../theme/tokens';
import type { CloneCloud } from '../worker/clone-cloud';
import type { Spread } from '../worker/spread';
import type { Trajectory } from '../worker/trajectory';
import { drawFindings } from './draw-findings';
import { drawFoot } from './draw-foot';
import { drawGround } from './draw-ground';
import { drawHead } from './draw-head';
import { drawRibbon } from './draw-ribbon';
import { drawScene, type SceneRequest } from './draw-scenes';
import { drawTargetPlane } from './draw-target-plane';
import { frame, type Pen, PLATE_FONTS } from './pen';
import { withText } from './png-text';

/** What the plate is made from: a snapshot of the desk, and nothing that moves. */
interface PlateInput extends SceneRequest {
  report: Report;
  trajectory: Trajectory;
  /** Of the report; null without a covariance. */
  spread: Spread | null;
  /** Of the principal approach; null when there are none. */
  clones?: CloneCloud | null;
  palette: Palette;
  /** Ids of the findings chosen for the plate. */
  findings: readonly string[];
}

const WIDTH_PX = 2400;
const HEIGHT_PX = 1350;

const LEFT = 76;
const RIGHT = 2324;
/** Baseline of the last line of the foot. */
const BOTTOM = 1302;
/** Left: both scenes over the ribbon. Right: the findings over the plates of the encounter. */
const SCENE_WIDTH = 736;
const GUTTER = 22;
const COLUMN_LEFT = LEFT + 2 * SCENE_WIDTH + GUTTER + 52;
const LOWER_HEIGHT = 312;
/** Width of the target plane where the ground takes its place beside it. */
const NARROW_PLANE = 302;

/**
 * The briefing as a PNG of 2400 × 1350 pixels, matched to its JSON report by the fingerprint that
 * stands in the foot line and, for machines, in a text chunk of the file.
 *
 * @throws Error when the browser gives no 2-D canvas
 */
export async function makePlate(input: PlateInput): Promise<Blob> {
  await Promise.all(PLATE_FONTS.map((font) => document.fonts.load(font)));
  const canvas = document.createElement('canvas');
  canvas.width = WIDTH_PX;
  canvas.height = HEIGHT_PX;
  const context = canvas.getContext('2d');
  if (context === null) throw new Error('The browser gives no canvas to draw the plate on.');
  drawPlate({ context, palette: input.palette }, withinPath(input));
  const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'));
  if (blob === null) throw new Error('The browser could not write the plate as a PNG.');
  const bytes = withText(new Uint8Array(await blob.arrayBuffer()), {
    Title: `Skimline plate: ${input.report.case.name}`,
    Software: 'Skimline',
    Fingerprint: input.report.fingerprint,
  });
  return new Blob([bytes], { type: 'image/png' });
}

/** The clock may stand past the end of a path that ends on the ground. */
function withinPath(input: PlateInput): PlateInput {
  const { trajectory, clockTdbSeconds } = input;
  const { fromTdbSeconds, toTdbSeconds } = trajectory;
  const within = Math.min(Math.max(clockTdbSeconds, fromTdbSeconds), toTdbSeconds);
  return { ...input, clockTdbSeconds: within };
}

/**
 * Head and foot take the room their words need; what lies between shares the rest. Without a target
 * plane the findings have the whole column.
 */
function drawPlate(pen: Pen, input: PlateInput): void {
  const { context, palette } = pen;
  const { report, trajectory, spread, clockTdbSeconds } = input;
  context.fillStyle = palette.ground;
  context.fillRect(0, 0, WIDTH_PX, HEIGHT_PX);
  frame(pen, { x: 22, y: 22, width: WIDTH_PX - 44, height: HEIGHT_PX - 44 }, palette.ink, 3);
  frame(pen, { x: 30, y: 30, width: WIDTH_PX - 60, height: HEIGHT_PX - 60 }, palette.ink, 1);
  const headBottom = drawHead(pen, report, LEFT, RIGHT);
  const footTop = drawFoot(pen, report, LEFT, RIGHT, BOTTOM);
  const lower = footTop - 20 - LOWER_HEIGHT;
  const upper = headBottom + 58;
  const height = lower - 40 - upper;
  drawScene(pen, { x: LEFT, y: upper, width: SCENE_WIDTH, height }, 'sun', input);
  const second = LEFT + SCENE_WIDTH + GUTTER;
  drawScene(pen, { x: second, y: upper, width: SCENE_WIDTH, height }, 'earth', input);
  const ribbon = { x: LEFT, y: lower, width: 2 * SCENE_WIDTH + GUTTER, height: LOWER_HEIGHT };
  drawRibbon(pen, ribbon, report, trajectory, spread, clockTdbSeconds);
  const column = { x: COLUMN_LEFT, width: RIGHT - COLUMN_LEFT };
  const chosen = report.findings.filter(
    (finding) => finding.kind !== 'answer' && input.findings.includes(finding.id),
  );
  const principal = report.principal === null ? null : report.approaches[report.principal];
  const hasPlane = principal !== null && principal.targetPlane !== null;
  const top = upper - 14;
  const end = hasPlane ? lower - 34 : lower + LOWER_HEIGHT;
  drawFindings(pen, { ...column, y: top, height: end - top }, chosen, report.cautions);
  if (principal === null || !hasPlane) return;
  const place = { ...column, y: lower, height: LOWER_HEIGHT };
  const corridor = report.corridor ?? null;
  if (principal.entry === undefined && corridor === null) {
    drawTargetPlane(pen, place, principal, input.clones ?? null);
    return;
  }
  drawTargetPlane(pen, { ...place, width: NARROW_PLANE }, principal, input.clones ?? null);
  const beside = NARROW_PLANE + 28;
  drawGround(
    pen,
    { ...place, x: COLUMN_LEFT + beside, width: column.width - beside },
    principal,
    trajectory,
    corridor,
  );
}
