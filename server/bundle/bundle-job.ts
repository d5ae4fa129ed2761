import type { ContentAbout, ContentCell } from "../../shared/bundle/contents.ts";
import type { DataSpecification } from "../../shared/schemas/data.ts";
import type { BundleManifest } from "../../shared/schemas/replication-bundle.ts";
import type { SystemSpecification } from "../../shared/schemas/system.ts";

/** What a data cell reads and asks, as a worker finds it. */
export interface DataRead {
  readonly fingerprint: string;
  readonly specification: DataSpecification;
  readonly uploadId: string;
}

/** A bundle to write. Plain data, so that it crosses threads. */
export interface BundleJob {
  /** Where the archive is written to; no file is there yet. */
  readonly path: string;
  /** Complete but for what is found out while writing: files of cells, moments, and SHA-256 of the data. */
  readonly manifest: Omit<BundleManifest, "cells">;
  readonly about: ContentAbout;
  readonly cells: readonly ContentCell[];
  readonly uploads: readonly { readonly file: string; readonly uploadId: string; readonly bytes: number }[];
  /** Systems whose moments are stored, where the data are withheld. */
  readonly moments: readonly {
    readonly cell: string;
    readonly specification: SystemSpecification;
    readonly data: DataRead;
  }[];
}

export interface BundleWritten {
  readonly bytes: number;
  readonly manifest: BundleManifest;
}
