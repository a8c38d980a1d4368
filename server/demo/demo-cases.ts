import type { z } from 'zod';
import type { demoBenches } from '#server/demo/demo-benches.ts';
import type { demoPeople } from '#server/demo/demo-people.ts';
import type { DemoExposure } from '#server/demo/demo-picture.ts';
import { unequalHoles } from '#server/demo/unequal-holes.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import type { caseDraftSchema } from '#shared/contracts/cases.ts';

const um = 1e-6;
const degrees = Math.PI / 180;

/** How far a demo case is taken once its exposures are identified. */
export type DemoEnding = 'identified' | 'submitted' | 'confirmed' | 'returned';

export interface DemoCase {
  readonly id: string;
  readonly by: keyof typeof demoPeople;
  readonly draft: z.input<typeof caseDraftSchema>;
  readonly bench: keyof typeof demoBenches;
  readonly exposures: readonly { id: string; name: string; picture: DemoExposure }[];
  readonly ending: DemoEnding;
}

const caseId = (n: number) => `00000000-0000-4000-8000-0000000003${String(n).padStart(2, '0')}`;
const exposureId = (n: number) => `00000000-0000-4000-8000-0000000004${String(n).padStart(2, '0')}`;

const at = (width: number, height: number, dx = 0, dy = 0) => ({
  width,
  height,
  center: { x: width / 2 + dx, y: height / 2 + dy },
});

/** Slits that are longer than the beam is wide: the last value is the beam's extent. */
function beamLit(family: string, values: readonly number[]) {
  return { model: familyOf(family).models.find((m) => m.id === 'beam-lit')!, values };
}

/** The scenario: a maker of metering valves sends openings whose shape or size is in doubt. */
export const demoCases: readonly DemoCase[] = [
  {
    id: caseId(1),
    by: 'analyst',
    bench: 'sensor',
    ending: 'identified',
    draft: {
      title: 'Which way round was the slot cut?',
      part: 'Metering plate, slot A3',
      lot: 'lot 7',
      specimen: '7-A3',
      question: 'Is A3 within its drawing, and does the long axis follow the flow?',
      drawing: {
        aperture: { family: 'slot', values: { length: 212 * um, width: 84 * um } },
        limits: { length: { lower: 207 * um, upper: 217 * um }, width: { lower: 81 * um, upper: 87 * um } },
      },
    },
    exposures: [
      {
        id: exposureId(1),
        name: 'plate-7-a3-1of64.png',
        picture: {
          opening: { family: 'slot', values: { length: 213.1 * um, width: 83.4 * um } },
          orientation: 27.3 * degrees,
          ...at(720, 640, 11.3, -7.8),
          peak: 2.4,
          seed: 11,
        },
      },
    ],
  },
  {
    id: caseId(2),
    by: 'secondAnalyst',
    bench: 'sensor',
    ending: 'submitted',
    draft: {
      title: 'Restrictor hole, drilled or punched?',
      part: 'Flow restrictor, returned unit 12',
      lot: 'returns',
      specimen: 'R-12',
      question: 'A drilled hole is round within 1 %, a punched one is not.',
    },
    exposures: [
      {
        id: exposureId(2),
        name: 'restrictor-r12.png',
        picture: {
          opening: { family: 'ellipse', values: { major: 168.4 * um, minor: 151.2 * um } },
          orientation: 152 * degrees,
          ...at(640, 640, -14.2, 9.1),
          peak: 0.85,
          seed: 12,
        },
      },
    ],
  },
  {
    id: caseId(3),
    by: 'analyst',
    bench: 'lens',
    ending: 'confirmed',
    draft: {
      title: 'Slit jaws after cleaning',
      part: 'Slit jaws, pair 3',
      lot: 'service',
      specimen: 'J-3',
      question: 'Width after cleaning; the log says 55 µm.',
    },
    exposures: [
      {
        id: exposureId(3),
        name: 'jaws-3-after.png',
        picture: {
          opening: beamLit('slit', [55.3 * um, 420 * um]),
          orientation: 84.1 * degrees,
          ...at(768, 576, 6.4, 3.3),
          peak: 0.8,
          seed: 13,
        },
      },
    ],
  },
  {
    id: caseId(4),
    by: 'analyst',
    bench: 'lens',
    ending: 'returned',
    draft: {
      title: 'Encoder window out of a worn strip',
      part: 'Encoder mask, strip 19',
      lot: 'strip 19',
      specimen: '19-4',
      question: 'Window length and width; the drawing is lost.',
    },
    exposures: [
      {
        id: exposureId(4),
        name: 'strip-19-window-4.png',
        picture: {
          opening: { family: 'rectangle', values: { length: 190.2 * um, width: 119.6 * um } },
          orientation: 8.5 * degrees,
          ...at(700, 560, 4.2, -12.6),
          peak: 0.9,
          seed: 14,
        },
      },
    ],
  },
  {
    id: caseId(5),
    by: 'analyst',
    bench: 'sensor',
    ending: 'identified',
    draft: {
      title: 'Alignment pinhole without a label',
      part: 'Spatial filter, spare',
      lot: '',
      specimen: 'SF-0',
      question: 'Which pinhole is it: 100, 150 or 200 µm?',
      drawing: {
        aperture: { family: 'pinhole', values: { diameter: 150 * um } },
        limits: { diameter: { lower: 147 * um, upper: 153 * um } },
      },
    },
    exposures: [
      {
        id: exposureId(5),
        name: 'filter-spare.png',
        picture: {
          opening: { family: 'pinhole', values: { diameter: 150.6 * um } },
          orientation: 0,
          ...at(640, 512, 3.7, 15.2),
          peak: 3.5,
          seed: 15,
        },
      },
    ],
  },
  {
    id: caseId(6),
    by: 'secondAnalyst',
    bench: 'screen',
    ending: 'identified',
    draft: {
      title: 'Double slit from the teaching store',
      part: 'Interferometer insert',
      lot: '',
      specimen: 'INS-2',
      question: 'Slit width and separation, photographed off a paper screen.',
    },
    exposures: [
      {
        id: exposureId(6),
        name: 'insert-2-screen.png',
        picture: {
          opening: beamLit('doubleSlit', [60 * um, 180 * um, 900 * um]),
          orientation: 91 * degrees,
          ...at(900, 500, -9.5, 4.4),
          peak: 1.6,
          seed: 16,
        },
      },
    ],
  },
  {
    id: caseId(8),
    by: 'secondAnalyst',
    bench: 'lens',
    ending: 'identified',
    draft: {
      title: 'Slot or ellipse? Faint pattern',
      part: 'Alignment mask, field 2',
      lot: 'batch 30',
      specimen: '30-2',
      question: 'Drilled twice or punched? The coating lets little light through.',
    },
    exposures: [
      {
        id: exposureId(8),
        name: 'mask-30-2-faint.png',
        picture: {
          opening: { family: 'slot', values: { length: 128 * um, width: 118 * um } },
          orientation: 33 * degrees,
          ...at(420, 400, -4.9, 3.8),
          peak: 0.01,
          seed: 18,
        },
      },
    ],
  },
  {
    id: caseId(9),
    by: 'secondAnalyst',
    bench: 'sensor',
    ending: 'identified',
    draft: {
      title: 'Drill broke through twice?',
      part: 'Nozzle blank 44',
      lot: 'lot 9',
      specimen: '9-44',
      question: 'What is in the plate beside the hole of the drawing?',
      drawing: {
        aperture: { family: 'pinhole', values: { diameter: 120 * um } },
        limits: { diameter: { lower: 116 * um, upper: 124 * um } },
      },
    },
    exposures: [
      {
        id: exposureId(9),
        name: 'nozzle-44.png',
        picture: {
          opening: { model: unequalHoles, values: [121.4 * um, 61 * um, 138 * um] },
          orientation: 64 * degrees,
          ...at(640, 640, 7.9, -3.2),
          peak: 1.2,
          seed: 19,
        },
      },
    ],
  },
];

/** A case that somebody has opened and not yet photographed for. */
export const demoEmptyCase = {
  id: caseId(7),
  by: 'both',
  draft: {
    title: 'Stencil opening, corner suspected round',
    part: 'Paste stencil, field 4',
    lot: 'batch 31',
    specimen: '31-4',
    question: 'Square of 240 µm? Take a long exposure for the corners.',
    drawing: {
      aperture: { family: 'square', values: { side: 240 * um } },
      limits: { side: { lower: 232 * um, upper: 248 * um } },
    },
  },
} as const;
