import { GATE_DRIVE_PARTS } from '../../../demo/gate-drive.ts';

/** The demo's parts are the examples that the OpenAPI publishes. */
export const EXAMPLES: unknown[] = [...GATE_DRIVE_PARTS];
