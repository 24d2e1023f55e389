/** What the drawing promises. */
export interface Drawing {
  readonly inductance: {
    readonly nominal_H: number;
    readonly lower_H: number;
    readonly upper_H: number;
    /** absent: at zero current */
    readonly testCurrent_A?: number;
    readonly testFrequency_Hz?: number;
  };
  readonly resistance?: { readonly upper_ohm: number; readonly temperature_degC: number };
  readonly saturation?: {
    readonly current_A: number;
    readonly inductanceDrop: number;
    readonly temperature_degC: number;
  };
  readonly thermal?: { readonly current_A: number; readonly rise_K: number };
}
