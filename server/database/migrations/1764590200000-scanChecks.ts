import type { MigrationInterface, QueryRunner } from 'typeorm'

/** Findings with answers, thresholds, jobs, bias series, the measuring bench, and where a scan came from. */
export class ScanChecks1764590200000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    for (const statement of STATEMENTS) await runner.query(statement)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE scan DROP FOREIGN KEY scan_bias_series_exists')
    await runner.query(
      'ALTER TABLE scan DROP INDEX scan_bias_series_exists, DROP COLUMN origin, DROP COLUMN parentScanIds, DROP COLUMN biasSeriesId',
    )
    for (const table of [
      'raw_measurement',
      'bench_item',
      'job',
      'project_thresholds',
      'scan_check',
      'finding',
      'bias_series',
    ])
      await runner.query(`DROP TABLE ${table}`)
  }
}

const STATEMENTS = [
  `CREATE TABLE bias_series (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     deviceId uuid NOT NULL,
     junctionId uuid NOT NULL,
     name varchar(120) NOT NULL,
     varied varchar(20) NOT NULL,
     version int NOT NULL,
     PRIMARY KEY (id),
     INDEX bias_series_of_junction (junctionId),
     CONSTRAINT bias_series_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT bias_series_junction_exists FOREIGN KEY (junctionId) REFERENCES junction (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `ALTER TABLE scan
     ADD COLUMN origin varchar(20) NOT NULL DEFAULT 'eqe-file',
     ADD COLUMN parentScanIds longtext NOT NULL DEFAULT '[]',
     ADD COLUMN biasSeriesId uuid NULL,
     ADD CONSTRAINT scan_bias_series_exists FOREIGN KEY (biasSeriesId) REFERENCES bias_series (id) ON DELETE SET NULL ON UPDATE NO ACTION`,
  `ALTER TABLE scan ALTER COLUMN origin DROP DEFAULT, ALTER COLUMN parentScanIds DROP DEFAULT`,
  `CREATE TABLE finding (
     id uuid NOT NULL,
     scanId uuid NOT NULL,
     \`check\` varchar(60) NOT NULL,
     \`rank\` int NOT NULL,
     severity varchar(20) NOT NULL,
     title varchar(200) NOT NULL,
     message text NOT NULL,
     advice text NOT NULL,
     bandsNm longtext NOT NULL,
     numbers longtext NOT NULL,
     junctionPosition int NOT NULL,
     foundAt datetime(3) NOT NULL,
     answerKind varchar(20) NULL,
     repeatedAsScanId uuid NULL,
     answerReason varchar(1000) NOT NULL,
     answeredById uuid NULL,
     answeredAt datetime(3) NULL,
     PRIMARY KEY (id),
     UNIQUE INDEX finding_of_check_on_scan (scanId, \`check\`),
     CONSTRAINT finding_scan_exists FOREIGN KEY (scanId) REFERENCES scan (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT finding_answerer_exists FOREIGN KEY (answeredById) REFERENCES \`user\`(id) ON DELETE RESTRICT ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE scan_check (
     scanId uuid NOT NULL,
     inputsHash char(64) NOT NULL,
     passed longtext NOT NULL,
     notChecked longtext NOT NULL,
     checkedAt datetime(3) NOT NULL,
     PRIMARY KEY (scanId),
     CONSTRAINT scan_check_scan_exists FOREIGN KEY (scanId) REFERENCES scan (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE project_thresholds (
     projectId uuid NOT NULL,
     settings longtext NOT NULL,
     version int NOT NULL,
     PRIMARY KEY (projectId),
     CONSTRAINT project_thresholds_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE job (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     kind varchar(40) NOT NULL,
     state varchar(20) NOT NULL,
     done int NOT NULL,
     total int NOT NULL,
     message varchar(1000) NOT NULL,
     runId uuid NULL,
     leaseUntil datetime(3) NULL,
     requestedById uuid NULL,
     createdAt datetime(3) NOT NULL,
     endedAt datetime(3) NULL,
     PRIMARY KEY (id),
     INDEX job_due (state, leaseUntil),
     INDEX job_newest_in_project (projectId, createdAt),
     CONSTRAINT job_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT job_requester_exists FOREIGN KEY (requestedById) REFERENCES \`user\`(id) ON DELETE RESTRICT ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE bench_item (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     kind varchar(20) NOT NULL,
     name varchar(120) NOT NULL,
     content longtext NOT NULL,
     version int NOT NULL,
     createdAt datetime(3) NOT NULL,
     updatedAt datetime(3) NOT NULL,
     updatedById uuid NOT NULL,
     PRIMARY KEY (id),
     UNIQUE INDEX bench_item_name_in_project (projectId, kind, name),
     CONSTRAINT bench_item_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT bench_item_editor_exists FOREIGN KEY (updatedById) REFERENCES \`user\`(id) ON DELETE RESTRICT ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE raw_measurement (
     scanId uuid NOT NULL,
     reduction longtext NOT NULL,
     deviceColumns longtext NOT NULL,
     referenceColumns longtext NOT NULL,
     detectorName varchar(120) NOT NULL,
     calibration longtext NOT NULL,
     PRIMARY KEY (scanId),
     CONSTRAINT raw_measurement_scan_exists FOREIGN KEY (scanId) REFERENCES scan (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
]
