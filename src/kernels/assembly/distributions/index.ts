// Exports of the distributions group: block passes from uniforms (or normals) to inputs, in place.
export { closedBlock } from "./closed";
export { piecesBlock } from "./pieces";
export { stepsBlock } from "./steps";
export { linearBlock } from "./linear";
