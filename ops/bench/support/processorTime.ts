import { readFileSync } from 'node:fs';
import { pool } from '#db/queries/connection';

/** Milliseconds of processor time: of the web, of the database (NaN where it runs elsewhere), of this process. */
export interface ProcessorTime {
  web: number;
  database: number;
  own: number;
}

/** Processor time of several turns added up. */
export class SpentTime implements ProcessorTime {
  web = 0;
  database = 0;
  own = 0;

  add({ web, database, own }: ProcessorTime): void {
    this.web += web;
    this.database += database;
    this.own += own;
  }
}

/** Tells how much processor time the processes of a benchmark have had so far. */
export class ProcessorTimes {
  private constructor(
    private readonly web: { readonly cpuMs: number },
    private readonly databasePid: number,
  ) {}

  static async of(web: { readonly cpuMs: number }): Promise<ProcessorTimes> {
    return new ProcessorTimes(web, await pidOfDatabase());
  }

  get soFar(): ProcessorTime {
    const { user, system } = process.cpuUsage();
    const database = Number.isNaN(this.databasePid) ? NaN : processorMs(this.databasePid);
    return { web: this.web.cpuMs, database, own: (user + system) / 1000 };
  }

  /** What they had of it while something ran. */
  async during(work: () => Promise<unknown>): Promise<ProcessorTime> {
    const before = this.soFar;
    await work();
    const after = this.soFar;
    return {
      web: after.web - before.web,
      database: after.database - before.database,
      own: after.own - before.own,
    };
  }
}

/** Processor time that all threads of a process have had so far, in milliseconds. */
export function processorMs(pid: number): number {
  const cells = readFileSync(`/proc/${pid}/stat`, 'utf8')
    .replace(/^.*\) /, '')
    .split(' ');
  return (Number(cells[11]) + Number(cells[12])) * 10;
}

async function pidOfDatabase(): Promise<number> {
  const [[row]] = (await pool().raw('SELECT @@pid_file AS file')) as [{ file: string }[]];
  try {
    return Number(readFileSync(row?.file ?? '', 'utf8'));
  } catch {
    return NaN;
  }
}
