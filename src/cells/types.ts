import type { ComponentType } from "react";
import type { CellKind, FindingOf } from "../../shared/schemas/cell.ts";
import type { Upload } from "../../shared/schemas/resources.ts";
import type { CellStatus } from "../../shared/schemas/status.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { LabelledTable } from "../../shared/tables/table.ts";

/** What a form needs: the YAML it writes, and what there is to choose from. */
export interface FormProps {
  readonly source: string;
  readonly onChange: (nextSource: string) => void;
  readonly readOnly: boolean;
  /** Gives a good another name in this source and wherever else it is named; absent where there is nothing else. */
  readonly onRenameGood?: (good: string, name: string) => void;
  readonly context: { readonly cells: readonly CellSource[]; readonly uploads: readonly Upload[] };
  /** Shows rows of the upload beside the finding; absent where rows are not to be seen. */
  readonly onLook?: (rows: LookedAt) => void;
}

/** Rows that something found is about, by its key, with a title for the list. */
export interface LookedAt {
  readonly about: string;
  readonly title: string;
}

/** A finding within the study: the sentence, the verdicts, one table. The state line above it is the band's. */
export interface BandProps<K extends CellKind> {
  readonly finding: FindingOf<K>;
  readonly status?: CellStatus;
}

/** A finding in full. With a form it may be edited where it stands (a data cell's goods). */
export interface OpenProps<K extends CellKind> extends BandProps<K> {
  readonly form?: FormProps;
}

type Loaded<T> = () => Promise<T>;

/**
 * What a kind of cell shows, each part loaded when it is first needed: whoever opens a study reads its findings, and
 * need not wait for forms, opened cells and copying. Views take findings as props and fetch nothing.
 */
export interface CellView<K extends CellKind> {
  /** Absent where the source is prose, which is written as it stands. */
  readonly Form?: Loaded<ComponentType<FormProps>>;
  readonly Band: Loaded<ComponentType<BandProps<K>>>;
  readonly Open: Loaded<ComponentType<OpenProps<K>>>;
  /** What stands on the source page of the opened cell above its form: rulers that move what the finding shows. */
  readonly Controls?: Loaded<ComponentType<OpenProps<K>>>;
  /** What stands on the source page of the opened cell below its form: how each check is made. */
  readonly Aside?: Loaded<ComponentType<{ finding: FindingOf<K> }>>;
  /** The finding's tables, the one to copy first: for *Copy table* on the state line. */
  readonly tables: Loaded<(finding: FindingOf<K>) => LabelledTable[]>;
}
