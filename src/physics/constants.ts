/**
 * Vacuum magnetic permeability µ0 in H/m.
 * CODATA 2022 recommended value (NIST, 2024): 1.256 637 061 27(20) × 10⁻⁶ N/A². It differs from 4π × 10⁻⁷ by 1.3e-10 relative,
 * so published figures worked with 4π × 10⁻⁷ agree to every printed digit.
 */
export const VACUUM_PERMEABILITY_H_PER_M = 1.25663706127e-6;
