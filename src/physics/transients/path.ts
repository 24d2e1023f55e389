/** What takes the current on when it is interrupted. Resistances in Ω, ≥ 0. */
export type Path = ResistorPath | DiodePath | ClampPath | SnubberPath;

export interface ResistorPath {
  readonly kind: 'resistor';
  readonly resistance_ohm: number;
}

/** A freewheeling diode: a constant forward drop, conducting one way only; `resistance_ohm` in series, absent: none. */
export interface DiodePath {
  readonly kind: 'diode';
  readonly forwardDrop_V: number;
  readonly resistance_ohm?: number;
}

/** A clamp (suppressor diode, varistor taken as ideal): a constant voltage, one way; `resistance_ohm` in series, absent: none. */
export interface ClampPath {
  readonly kind: 'clamp';
  readonly clamp_V: number;
  readonly resistance_ohm?: number;
}

/** Resistor and capacitor in series, the capacitor empty when the current is interrupted. */
export interface SnubberPath {
  readonly kind: 'snubber';
  readonly resistance_ohm: number;
  readonly capacitance_F: number;
}

/** The voltage across a path in V while it carries `current_A` ≥ 0, is constantVoltage_V + resistance_ohm·current_A. */
export interface StaticPath {
  readonly constantVoltage_V: number;
  readonly resistance_ohm: number;
  /** It cannot carry a current back: at zero the current stays there. */
  readonly oneWay: boolean;
  /** RFC 6901 pointer, relative to the path, of the field that brings the current down. */
  readonly field: '/resistance_ohm' | '/forwardDrop_V' | '/clamp_V';
}

/** A path without a capacitor as a constant voltage and a resistance in series. */
export function staticPath(path: ResistorPath | DiodePath | ClampPath): StaticPath {
  switch (path.kind) {
    case 'resistor':
      return { constantVoltage_V: 0, resistance_ohm: path.resistance_ohm, oneWay: false, field: '/resistance_ohm' };
    case 'diode':
      return {
        constantVoltage_V: path.forwardDrop_V,
        resistance_ohm: path.resistance_ohm ?? 0,
        oneWay: true,
        field: '/forwardDrop_V',
      };
    case 'clamp':
      return {
        constantVoltage_V: path.clamp_V,
        resistance_ohm: path.resistance_ohm ?? 0,
        oneWay: true,
        field: '/clamp_V',
      };
  }
}
