export { evolveMoving, evolveMovingRate, evolveStill, evolveStillRate } from './evolution';
export { pack8, pack16, packThree8, packThree16 } from './packing';
export { transformGradient, transformHeight, transformStrain } from './pairs';
export { storeCodes, storeFloats, storeHalves } from './samples';
export { fieldRows, jacobianRows, largestMagnitude, normalRows } from './surface';
export { transformColumns, transformRow } from './transform';
