import { type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { type NetworkRow } from '#db/queries/networks';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import {
  MANIFEST_FORM,
  type DataDigest,
  type ManifestFile,
  type SummaryManifest,
} from '#lib/contracts/summaryManifest';

export interface SealGround {
  network: NetworkRow;
  revision: number;
  supersedes: Pick<IssuedSummaryRow, 'revision' | 'manifestSha256'> | null;
  issuedAt: Date;
  issuedBy: string;
  files: ManifestFile[];
  data: DataDigest;
  templateVersion: number;
  software: string;
  auditHead: SummaryManifest['auditHead'];
  publicKey: string;
}

/** The manifest of a month that is issued: the very text that is signed. */
export function manifestText(doc: MonthDocument, ground: SealGround): string {
  const { supersedes } = ground;
  const manifest: SummaryManifest = {
    form: MANIFEST_FORM,
    network: { slug: ground.network.slug, name: ground.network.name },
    month: doc.month,
    revision: ground.revision,
    supersedes: supersedes && {
      revision: supersedes.revision,
      manifestSha256: supersedes.manifestSha256.toString('hex'),
    },
    issuedAt: ground.issuedAt.toISOString(),
    issuedBy: ground.issuedBy,
    files: ground.files,
    data: ground.data,
    limits: doc.limits.map(({ id, version }) => ({ id, version })),
    settings: doc.conventions,
    template: ground.templateVersion,
    software: ground.software,
    auditHead: ground.auditHead,
    publicKey: ground.publicKey,
  };
  return `${JSON.stringify(manifest, null, 2)}\n`;
}

/** The format of an issued file by its name: `merrow-2026-03-r2.csv.zip` is `csv`. */
export function formatOf(name: string): string {
  return /\.(pdf|xlsx|csv|json)(?:\.zip)?$/.exec(name)?.[1] ?? 'other';
}
