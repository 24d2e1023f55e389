import { GATE_DRIVE_MATERIAL, GATE_DRIVE_PARTS, GATE_DRIVE_RIG } from '../../../demo/gate-drive.ts';

const { number, revision, ...released } = GATE_DRIVE_PARTS[0]!.part;

export const EXAMPLE_MATERIAL = GATE_DRIVE_MATERIAL;
export const EXAMPLE_RIG = GATE_DRIVE_RIG;
/** Also what the lot's example refers to: the OpenAPI's examples are sent in the order in which they are published. */
export const EXAMPLE_PART = released;
export const EXAMPLE_LOT = { part: { number, revision }, size: 500, supplierReference: 'shipment 17' };
