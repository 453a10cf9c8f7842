// Consumers type-check these sources without this package's tsconfig, so the declarations must travel with the importing file; an import cannot name them.
// eslint-disable-next-line @typescript-eslint/triple-slash-reference -- ambient declarations of an untyped package
/// <reference path="./astronomia.d.ts" />
export { Precessor } from 'astronomia/precess';
export { apparent as apparentSiderealTimeSeconds, mean as meanSiderealTimeSeconds } from 'astronomia/sidereal';
export { apparentEquatorial as apparentSun } from 'astronomia/solar';
