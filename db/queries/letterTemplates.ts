import { pool, type Connection } from './connection';

/** One version of a network's letter template. */
export interface TemplateVersion {
  id: number;
  /** Number of the template in its network, the same in all its versions. */
  template: number;
  version: number;
  name: string;
  /** Text with fields such as `{{laeq}}`. */
  body: string;
  /** This version withdraws the template. */
  isWithdrawn: boolean;
  createdByName: string | null;
  createdAt: Date;
}

/** Every version of a network's templates: by template, the latest version first. */
export async function listTemplateVersions(
  networkId: number,
  conn: Connection = pool(),
): Promise<TemplateVersion[]> {
  const rows = await conn('letter_templates as t')
    .leftJoin('users as u', 'u.id', 't.created_by')
    .where({ 't.network_id': networkId })
    .orderBy([{ column: 't.template' }, { column: 't.version', order: 'desc' }])
    .select({
      id: 't.id',
      template: 't.template',
      version: 't.version',
      name: 't.name',
      body: 't.body',
      isWithdrawn: 't.is_withdrawn',
      createdByName: 'u.name',
      createdAt: 't.created_at',
    });
  return rows.map((row) => ({ ...row, isWithdrawn: Boolean(row.isWithdrawn) }));
}

export interface NewTemplateVersion {
  networkId: number;
  template: number;
  version: number;
  name: string;
  body: string;
  isWithdrawn: boolean;
  createdBy: string;
}

/** Adds a version; false when somebody added the same one before. */
export async function insertTemplateVersion(version: NewTemplateVersion, conn: Connection): Promise<boolean> {
  try {
    await conn('letter_templates').insert({
      network_id: version.networkId,
      template: version.template,
      version: version.version,
      name: version.name,
      body: version.body,
      is_withdrawn: version.isWithdrawn,
      created_by: version.createdBy,
      created_at: new Date(),
    });
    return true;
  } catch (error) {
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
    return false;
  }
}
