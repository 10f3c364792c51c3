import { type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { type NetworkRow } from '#db/queries/networks';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { MANIFEST_FORM, type ManifestFile, type SummaryManifest } from '#lib/contracts/summaryManifest';

export interface SealGround extends Pick<SummaryManifest, 'data' | 'limits' | 'settings'> {
  network: NetworkRow;
  month: string;
  revision: number;
  supersedes: Pick<IssuedSummaryRow, 'revision' | 'manifestSha256'> | null;
  issuedAt: Date;
  issuedBy: string;
  files: ManifestFile[];
  templateVersion: number;
  software: string;
  auditHead: SummaryManifest['auditHead'];
  publicKey: string;
}

/** What the manifest says of a month’s figures beside their data. */
export function manifestGrounds({
  limits,
  conventions,
}: MonthDocument): Pick<SummaryManifest, 'limits' | 'settings'> {
  return { limits: limits.map(({ id, version }) => ({ id, version })), settings: conventions };
}

/** The manifest of a month that is issued: the very text that is signed. */
export function manifestText(ground: SealGround): string {
  const { supersedes } = ground;
  const manifest: SummaryManifest = {
    form: MANIFEST_FORM,
    network: { slug: ground.network.slug, name: ground.network.name },
    month: ground.month,
    revision: ground.revision,
    supersedes: supersedes && {
      revision: supersedes.revision,
      manifestSha256: supersedes.manifestSha256.toString('hex'),
    },
    issuedAt: ground.issuedAt.toISOString(),
    issuedBy: ground.issuedBy,
    files: ground.files,
    data: ground.data,
    limits: ground.limits,
    settings: ground.settings,
    template: ground.templateVersion,
    software: ground.software,
    auditHead: ground.auditHead,
    publicKey: ground.publicKey,
  };
  return `${JSON.stringify(manifest, null, 2)}\n`;
}
