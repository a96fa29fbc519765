/** How the file stores a track's numbers: what its noise floor comes from. */
export interface Storage {
  /** `text` is decimal text of `decimals` places. Normalised integers are signed, as glTF 2.0 stores rotations. */
  readonly component: 'float64' | 'float32' | 'int16' | 'int8' | 'uint16' | 'uint8' | 'text';
  /** Decimal places of the values; with `component: 'text'` alone. */
  readonly decimals?: number;
  readonly timeComponent: 'float64' | 'float32' | 'int16' | 'int8' | 'uint16' | 'uint8' | 'text';
  /** Decimal places of the times; with `timeComponent: 'text'` alone. */
  readonly timeDecimals?: number;
  /** Step of the lattice that the values were found to lie on, where that is coarser than the component says. */
  readonly lattice?: number;
}

/** Storage of a track that was made in memory and rounded nowhere. */
export const EXACT_STORAGE: Storage = Object.freeze({ component: 'float64', timeComponent: 'float64' });
