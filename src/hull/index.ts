export {
  frictionCoefficientIttc57,
  frictionCoefficientRough,
  frictionCoefficientSchoenherr,
} from './friction.js';
export * from './types.js';
