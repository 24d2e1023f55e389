import type { ApprovalRequest } from '../approval/request.ts';
import type { Rig } from '../evidence/rig.ts';
import type { Material } from '../physics/core/material.ts';

/**
 * The wound parts of the drives that open the gates of a canal lock, with the duty of each and what a rig measured. Everything here
 * is invented: parts, numbers and readings.
 */

/** A bench of the works: its instrument's standard uncertainties. */
const BENCH = {
  inductance: { relative: 0.004, offset_H: 2e-9 },
  current: { relative: 0.002, offset_A: 0.002 },
  resistance: { relative: 0.002, offset_ohm: 2e-5 },
};

/** A power ferrite as its data sheet gives it. */
export const GATE_DRIVE_MATERIAL: Material = {
  initialPermeability: 2200,
  saturation: [
    { temperature_degC: 25, fluxDensity_T: 0.49 },
    { temperature_degC: 100, fluxDensity_T: 0.39 },
  ],
  loss: { k: 8.5, alpha: 1.3, beta: 2.5 },
};

/** The works' bench as a registered rig. */
export const GATE_DRIVE_RIG: Rig = {
  description: 'bench 2 of the coil works',
  instrument: BENCH,
  calibrationDue: '2027-03-31',
};

/** Smooths the rectified supply of a gate drive. Gapped ferrite E core: must hold its inductance and energy at full current, hot. */
const DC_LINK_CHOKE: ApprovalRequest = {
  part: {
    number: 'LG-DC-104',
    revision: 'C',
    description: 'DC-link choke of the gate drive, gapped ferrite',
    drawing: {
      inductance: { nominal_H: 0.00088, lower_H: 0.00076, upper_H: 0.001, testFrequency_Hz: 10000 },
      resistance: { upper_ohm: 0.063, temperature_degC: 20 },
      saturation: { current_A: 13, inductanceDrop: 0.3, temperature_degC: 90 },
      thermal: { current_A: 9, rise_K: 50 },
    },
    construction: {
      coil: {
        shape: 'cored',
        turns: 60,
        core: {
          effectiveArea_m2: 5.35e-4,
          effectiveLength_m: 0.147,
          minimumArea_m2: 5.2e-4,
          material: {
            initialPermeability: 2200,
            saturation: [
              { temperature_degC: 25, fluxDensity_T: 0.49 },
              { temperature_degC: 100, fluxDensity_T: 0.39 },
            ],
          },
          // The gap's area with its fringing is known from the first article's inductance: it binds more than a fringing rule.
          gap: { length_m: 0.004, area_m2: 8e-4 },
        },
      },
      winding: { turns: 60, meanTurnLength_m: 0.142, wireDiameter_m: 0.0018, layers: 3 },
    },
  },
  duty: {
    peakCurrent_A: 10,
    rmsCurrent_A: 8,
    ambient_degC: 40,
    coreTemperature_degC: 90,
    required: { inductanceAtPeak_H: 0.0006, storedEnergy_J: 0.03, fluxMargin: 0.1 },
    interruption: {
      path: { kind: 'diode', forwardDrop_V: 0.9, resistance_ohm: 2.2 },
      safeCurrent_A: 0.1,
      voltageLimit_V: 60,
      timeLimit_s: 0.01,
      pathEnergyLimit_J: 0.1,
    },
    hotspotLimit_degC: 115,
    evidence: { minimumUnits: 2 },
  },
  evidence: {
    units: [
      {
        serial: 'DC-0117',
        measuredAt: '2026-03-02T09:14:00+01:00',
        instrument: BENCH,
        temperature_degC: 90,
        resistance_ohm: 0.0739,
        sweep: {
          kind: 'differential',
          current_A: [0, 2, 4, 6, 8, 10, 11, 12, 13, 14, 15, 16],
          inductance_H: [
            0.000878, 0.0008775, 0.000876, 0.0008735, 0.000869, 0.000861, 0.000853, 0.000838, 0.000806, 0.000742,
            0.00052, 0.00015,
          ],
        },
      },
      {
        serial: 'DC-0118',
        measuredAt: '2026-03-02T09:16:30+01:00',
        instrument: BENCH,
        temperature_degC: 90,
        resistance_ohm: 0.0742,
        sweep: {
          kind: 'differential',
          current_A: [0, 2, 4, 6, 8, 10, 11, 12, 13, 14, 15, 16],
          inductance_H: [
            0.000889, 0.0008885, 0.000887, 0.000884, 0.000879, 0.00087, 0.000861, 0.000845, 0.00081, 0.000731, 0.00049,
            0.00014,
          ],
        },
      },
    ],
  },
};

/** Releases the gate's holding brake. No core: what matters is its resistance, how fast it lets go, and its stray field. */
const BRAKE_COIL: ApprovalRequest = {
  part: {
    number: 'LG-BR-021',
    revision: 'A',
    description: 'brake coil of the gate drive, air core',
    drawing: {
      inductance: { nominal_H: 0.0364, lower_H: 0.034, upper_H: 0.039 },
      resistance: { upper_ohm: 5.2, temperature_degC: 20 },
    },
    construction: {
      coil: { shape: 'multilayer', turns: 800, innerDiameter_m: 0.06, outerDiameter_m: 0.1, length_m: 0.05 },
      winding: { turns: 800, meanTurnLength_m: 0.2513, wireDiameter_m: 0.001, layers: 20, windowArea_m2: 0.001 },
    },
  },
  duty: {
    peakCurrent_A: 5,
    ambient_degC: 35,
    required: { storedEnergy_J: 0.4 },
    interruption: {
      path: { kind: 'clamp', clamp_V: 150 },
      safeCurrent_A: 0.05,
      voltageLimit_V: 200,
      timeLimit_s: 0.002,
      pathEnergyLimit_J: 0.5,
    },
    strayField: { distance_m: 0.6, limit_T: 0.0005 },
  },
};

/** Takes the ripple of the drive's converter. Powdered ring: soft saturation, so the inductance at peak current decides. */
const RIPPLE_CHOKE: ApprovalRequest = {
  part: {
    number: 'LG-RC-330',
    revision: 'B',
    description: 'ripple choke of the gate drive, powdered ring',
    drawing: {
      inductance: { nominal_H: 0.00023, lower_H: 0.0002, upper_H: 0.00026 },
      resistance: { upper_ohm: 0.03, temperature_degC: 20 },
    },
    construction: {
      coil: {
        shape: 'cored',
        turns: 40,
        core: {
          dimensions: { kind: 'ring', outerDiameter_m: 0.047, innerDiameter_m: 0.024, height_m: 0.018 },
          material: { initialPermeability: 60, saturation: { fluxDensity_T: 1 }, magnetisation: 'froehlich' },
        },
      },
      winding: { turns: 40, meanTurnLength_m: 0.069, wireDiameter_m: 0.0016 },
    },
  },
  duty: {
    peakCurrent_A: 9,
    rmsCurrent_A: 7,
    coreTemperature_degC: 85,
    required: { inductanceAtPeak_H: 0.000115, storedEnergy_J: 0.0055, fluxMargin: 0.4 },
  },
  evidence: {
    units: [
      {
        serial: 'RC-2231',
        measuredAt: '2026-03-03T14:02:10+01:00',
        instrument: BENCH,
        temperature_degC: 85,
        resistance_ohm: 0.0299,
        sweep: {
          kind: 'differential',
          current_A: [0, 1.5, 3, 4.5, 6, 7.5, 9, 10.5, 12],
          inductance_H: [
            0.0002305, 0.000212, 0.0001958, 0.0001816, 0.0001687, 0.0001573, 0.000147, 0.0001378, 0.0001294,
          ],
        },
      },
    ],
  },
};

/** Offered as a cheaper DC-link choke: a ferrite ring without a gap. It has the inductance, and no room for the energy. */
const UNGAPPED_TOROID: ApprovalRequest = {
  part: {
    number: 'LG-DC-105',
    revision: 'X1',
    description: 'offered in place of LG-DC-104: ferrite ring without a gap',
    drawing: {
      inductance: { nominal_H: 0.00084, lower_H: 0.00072, upper_H: 0.00096 },
      saturation: { current_A: 13, inductanceDrop: 0.3, temperature_degC: 90 },
    },
    construction: {
      coil: {
        shape: 'cored',
        turns: 16,
        core: {
          dimensions: { kind: 'ring', outerDiameter_m: 0.04, innerDiameter_m: 0.024, height_m: 0.016 },
          material: {
            initialPermeability: 2200,
            saturation: [
              { temperature_degC: 25, fluxDensity_T: 0.49 },
              { temperature_degC: 100, fluxDensity_T: 0.39 },
            ],
          },
        },
      },
    },
  },
  duty: {
    peakCurrent_A: 10,
    coreTemperature_degC: 90,
    required: { inductanceAtPeak_H: 0.0006, storedEnergy_J: 0.03, fluxMargin: 0.1 },
  },
};

export const GATE_DRIVE_PARTS: readonly ApprovalRequest[] = [DC_LINK_CHOKE, BRAKE_COIL, RIPPLE_CHOKE, UNGAPPED_TOROID];
