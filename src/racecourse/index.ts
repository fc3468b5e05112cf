export {
  COURSE_NAMES,
  type Course,
  type CourseName,
  courseOf,
  type Leg,
  legName,
  type Manoeuvres,
  NO_COST,
  namedCourse,
} from './course.js';
export {
  type CourseTime,
  courseTime,
  type ExpectedTime,
  expectedTime,
  type LegManner,
  type LegPart,
  type LegTime,
  legTime,
  NAUTICAL_MILE,
  type NoTime,
  type SailedPoint,
  sailedPoints,
} from './times.js';
export {
  observedWind,
  steadyWind,
  type WeibullWind,
  type WindTable,
  weibullScale,
  weibullWind,
  windTable,
} from './wind.js';
