export {
  createEphemeris,
  EPHEMERIS_COVERAGE,
  type Ephemeris,
  EphemerisFileError,
  EphemerisRangeError,
  ephemerisFileNames,
  loadEphemeris,
} from './ephemeris';
