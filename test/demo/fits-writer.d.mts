export interface Card {
  readonly key: string;
  readonly value: string | number | boolean | undefined;
  readonly comment?: string;
  readonly real?: boolean;
}

export interface Column {
  readonly name: string;
  readonly format: 'D' | 'E' | 'J' | 'I';
  readonly values: ArrayLike<number>;
  readonly unit?: string;
  readonly comment?: string;
  readonly scale?: number;
  readonly zero?: number;
  readonly nullValue?: number;
}

export interface Table {
  readonly name: string;
  readonly columns: readonly Column[];
  readonly cards?: readonly Card[];
}

export function writeFits(file: { primary?: readonly Card[]; tables: readonly Table[] }): Uint8Array;
export function formatCard(card: Card): string;
