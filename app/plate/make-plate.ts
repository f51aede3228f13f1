import type { Report } from '../../core/report/report';
import type { NamedDistances, Station } from '../store/store';
import { FONT_FIGURES, FONT_TEXT, type Palette } from '../theme/tokens';
import type { Trajectory } from '../worker/trajectory';
import { drawFindings } from './draw-findings';
import { drawGround } from './draw-ground';
import { drawRibbon } from './draw-ribbon';
import { drawTargetPlane } from './draw-target-plane';
import { type Area, frame, linesOf, type Pen, rule, shortened, write, writeCaps } from './pen';
import { withText } from './png-text';
import type { SceneName, SceneSource } from './scene-source';

/** What the plate is made from: a snapshot of the desk, and nothing that moves. */
export interface PlateInput {
  report: Report;
  trajectory: Trajectory;
  palette: Palette;
  clockTdbSeconds: number;
  /** Ids of the findings chosen for the plate. */
  findings: readonly string[];
  /** Null when the 3-D scenes cannot be drawn. */
  scenes: SceneSource | null;
  sunStation: Station;
  earthStation: Station;
  namedDistances: NamedDistances;
}

export const PLATE_WIDTH_PX = 2400;
export const PLATE_HEIGHT_PX = 1350;

const LEFT = 60;
const RIGHT = 2340;
const SCENES: Record<SceneName, Area> = {
  sun: { x: LEFT, y: 330, width: 750, height: 545 },
  earth: { x: 830, y: 330, width: 750, height: 545 },
};
const COLUMN = { x: 1630, width: RIGHT - 1630 };
const RIBBON: Area = { x: LEFT, y: 912, width: 1520, height: 318 };
const FOOT_Y = 1288;

/**
 * The briefing as a PNG of 2400 × 1350 pixels, matched to its JSON report by the fingerprint that
 * stands in the foot line and, for machines, in a text chunk of the file.
 *
 * @throws Error when the browser gives no 2-D canvas
 */
export async function makePlate(input: PlateInput): Promise<Blob> {
  await Promise.all(
    [`400 23px ${FONT_TEXT}`, `600 23px ${FONT_TEXT}`, `400 20px ${FONT_FIGURES}`].map((font) =>
      document.fonts.load(font),
    ),
  );
  const canvas = document.createElement('canvas');
  canvas.width = PLATE_WIDTH_PX;
  canvas.height = PLATE_HEIGHT_PX;
  const context = canvas.getContext('2d');
  if (context === null) throw new Error('The browser gives no canvas to draw the plate on.');
  const pen: Pen = { context, palette: input.palette };
  context.fillStyle = input.palette.ground;
  context.fillRect(0, 0, PLATE_WIDTH_PX, PLATE_HEIGHT_PX);
  drawHead(pen, input.report);
  drawScenes(pen, input);
  drawColumn(pen, input);
  drawRibbon(pen, RIBBON, input.report, input.trajectory, input.clockTdbSeconds);
  drawFoot(pen, input.report);
  const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'));
  if (blob === null) throw new Error('The browser could not write the plate as a PNG.');
  const bytes = withText(new Uint8Array(await blob.arrayBuffer()), {
    Title: `Skimline plate: ${input.report.case.name}`,
    Software: 'Skimline',
    Fingerprint: input.report.fingerprint,
  });
  return new Blob([bytes], { type: 'image/png' });
}

/** Title, and the answer in large type. */
function drawHead(pen: Pen, report: Report): void {
  const { palette } = pen;
  writeCaps(pen, 'Skimline · encounter plate', LEFT, 78, 20, palette.inkSoft);
  const name = { px: 50, weight: 600 } as const;
  write(pen, shortened(pen, report.case.name, name, 1500), LEFT, 138, name, palette.ink);
  const side = [
    ...(report.case.invented ? ['Invented case: no such object exists'] : []),
    ...(report.case.objectId === null ? [] : [report.case.objectId]),
  ];
  for (const [i, line] of side.entries()) {
    write(pen, line, RIGHT, 78 + i * 34, { px: 24 }, palette.inkSoft, 'right');
  }
  rule(
    pen,
    [
      [LEFT, 162],
      [RIGHT, 162],
    ],
    palette.ink,
    2,
  );
  const answer = report.findings[0]?.text ?? '';
  let px = 42;
  let lines = linesOf(pen, answer, { px }, RIGHT - LEFT);
  while (lines.length > 2 && px > 28) {
    px -= 2;
    lines = linesOf(pen, answer, { px }, RIGHT - LEFT);
  }
  for (const [i, line] of lines.slice(0, 3).entries()) {
    write(pen, line, LEFT, 222 + i * px * 1.25, { px }, palette.ink);
  }
}

function drawScenes(pen: Pen, input: PlateInput): void {
  const { context, palette } = pen;
  const titles: Record<SceneName, string> = { sun: 'Sun-centred', earth: 'Earth-centred' };
  const stations = { sun: input.sunStation, earth: input.earthStation };
  for (const scene of ['sun', 'earth'] as const) {
    const area = SCENES[scene];
    writeCaps(pen, titles[scene], area.x, area.y - 14, 17, palette.inkSoft);
    const picture =
      input.scenes?.render(
        scene,
        area.width,
        area.height,
        palette,
        input.clockTdbSeconds,
        stations[scene],
      ) ?? null;
    if (picture !== null) context.drawImage(picture, area.x, area.y, area.width, area.height);
    else {
      write(
        pen,
        'The 3-D view was not available on this machine (no WebGL).',
        area.x + area.width / 2,
        area.y + area.height / 2,
        { px: 22 },
        palette.inkSoft,
        'center',
      );
    }
    frame(pen, area, palette.ink);
  }
}

/** Right: findings above, the target plane and (with an entry) the ground below. */
function drawColumn(pen: Pen, { report, findings }: PlateInput): void {
  const principal = report.principal === null ? null : report.approaches[report.principal];
  const chosen = report.findings.filter(
    (finding) => finding.kind !== 'answer' && findings.includes(finding.id),
  );
  drawFindings(pen, { ...COLUMN, y: 316, height: 558 }, chosen);
  if (principal === null) return;
  const low = { y: 912, height: 318 };
  if (principal.entry === undefined) {
    drawTargetPlane(pen, { ...COLUMN, ...low }, principal);
    return;
  }
  drawTargetPlane(pen, { x: COLUMN.x, width: 302, ...low }, principal);
  drawGround(pen, { x: COLUMN.x + 330, width: COLUMN.width - 330, ...low }, principal);
}

/** Cautions, then model, ephemeris, time of making and fingerprint. */
function drawFoot(pen: Pen, report: Report): void {
  const { palette } = pen;
  const cautions = report.cautions.join(' ');
  if (cautions !== '') {
    const face = { px: 22, weight: 600 } as const;
    write(pen, shortened(pen, cautions, face, RIGHT - LEFT), LEFT, 1256, face, palette.ink);
  }
  rule(
    pen,
    [
      [LEFT, FOOT_Y - 18],
      [RIGHT, FOOT_Y - 18],
    ],
    palette.ink,
    2,
  );
  const { model } = report;
  const face = { px: 17 };
  const words = `n-body, Dormand–Prince 8(5,3), tolerance ${model.tolerance}; ephemeris JPL DE405, GM of ${model.gmSet}; searched ${model.span.fromUtc.slice(0, 10)} to ${model.span.toUtc.slice(0, 10)}; made ${report.madeAt}; everything was computed on one machine`;
  write(pen, shortened(pen, words, face, RIGHT - LEFT), LEFT, FOOT_Y + 8, face, palette.inkSoft);
  write(
    pen,
    `report fingerprint (SHA-256) ${report.fingerprint}`,
    LEFT,
    FOOT_Y + 34,
    { px: 17, figures: true },
    palette.ink,
  );
  write(
    pen,
    'The JSON report carries the same.',
    RIGHT,
    FOOT_Y + 34,
    face,
    palette.inkSoft,
    'right',
  );
}
