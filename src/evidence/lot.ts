/** A production lot of one part at one revision. */
export interface Lot {
  readonly part: { readonly number: string; readonly revision: string };
  /** units produced */
  readonly size?: number;
  readonly supplierReference?: string;
}
