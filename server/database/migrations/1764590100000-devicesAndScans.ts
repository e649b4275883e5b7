import type { MigrationInterface, QueryRunner } from 'typeorm'

/** Devices with their stacks, source files, scans, spectra, and how files of a shape were read. */
export class DevicesAndScans1764590100000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    for (const table of TABLES) await runner.query(table)
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of ['spectrum', 'scan', 'reading_memory', 'source_file', 'layer', 'junction', 'device'])
      await runner.query(`DROP TABLE ${table}`)
  }
}

const TABLES = [
  `CREATE TABLE device (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     name varchar(120) NOT NULL,
     sampleId varchar(200) NOT NULL,
     description text NOT NULL,
     series varchar(200) NOT NULL,
     apertureAreaCm2 double NULL,
     deviceAreaCm2 double NULL,
     terminals varchar(20) NOT NULL,
     version int NOT NULL,
     createdAt datetime(3) NOT NULL,
     updatedAt datetime(3) NOT NULL,
     deletedAt datetime(3) NULL,
     PRIMARY KEY (id),
     INDEX device_project (projectId, deletedAt),
     CONSTRAINT device_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE junction (
     id uuid NOT NULL,
     deviceId uuid NOT NULL,
     position int NOT NULL,
     label varchar(60) NOT NULL,
     absorber varchar(200) NOT NULL,
     nominalGapEv double NULL,
     thicknessNm double NULL,
     PRIMARY KEY (id),
     UNIQUE INDEX junction_position_in_device (deviceId, position),
     CONSTRAINT junction_device_exists FOREIGN KEY (deviceId) REFERENCES device (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE layer (
     id uuid NOT NULL,
     deviceId uuid NOT NULL,
     position int NOT NULL,
     name varchar(60) NOT NULL,
     material varchar(200) NOT NULL,
     thicknessNm double NULL,
     junctionIndex int NULL,
     PRIMARY KEY (id),
     UNIQUE INDEX layer_position_in_device (deviceId, position),
     CONSTRAINT layer_device_exists FOREIGN KEY (deviceId) REFERENCES device (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE source_file (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     name varchar(255) NOT NULL,
     sizeBytes int NOT NULL,
     sha256 char(64) NOT NULL,
     bytes longblob NOT NULL,
     state varchar(20) NOT NULL,
     uploadedAt datetime(3) NOT NULL,
     uploadedById uuid NOT NULL,
     PRIMARY KEY (id),
     UNIQUE INDEX source_file_bytes_in_project (projectId, sha256),
     INDEX source_file_newest (projectId, uploadedAt, id),
     CONSTRAINT source_file_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT source_file_uploader_exists FOREIGN KEY (uploadedById) REFERENCES \`user\`(id) ON DELETE RESTRICT ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE reading_memory (
     projectId uuid NOT NULL,
     shape char(64) NOT NULL,
     mapping longtext NOT NULL,
     confirmedAt datetime(3) NOT NULL,
     PRIMARY KEY (projectId, shape),
     CONSTRAINT reading_memory_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE scan (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     deviceId uuid NOT NULL,
     junctionId uuid NULL,
     sourceFileId uuid NOT NULL,
     sourceColumn int NOT NULL,
     quantity varchar(20) NOT NULL,
     label varchar(200) NOT NULL,
     points int NOT NULL,
     firstNm double NOT NULL,
     lastNm double NOT NULL,
     wavelengthNm mediumblob NOT NULL,
     \`values\` mediumblob NOT NULL,
     mapping longtext NOT NULL,
     conditions longtext NOT NULL,
     state varchar(20) NOT NULL,
     decidedById uuid NULL,
     decidedAt datetime(3) NULL,
     decisionReason varchar(1000) NOT NULL,
     uploadedAt datetime(3) NOT NULL,
     uploadedById uuid NOT NULL,
     version int NOT NULL,
     deletedAt datetime(3) NULL,
     PRIMARY KEY (id),
     INDEX scan_newest_in_project (projectId, uploadedAt, id),
     INDEX scan_of_device (deviceId, quantity, junctionId),
     CONSTRAINT scan_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT scan_device_exists FOREIGN KEY (deviceId) REFERENCES device (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT scan_junction_exists FOREIGN KEY (junctionId) REFERENCES junction (id) ON DELETE SET NULL ON UPDATE NO ACTION,
     CONSTRAINT scan_source_file_exists FOREIGN KEY (sourceFileId) REFERENCES source_file (id) ON DELETE RESTRICT ON UPDATE NO ACTION,
     CONSTRAINT scan_decider_exists FOREIGN KEY (decidedById) REFERENCES \`user\`(id) ON DELETE RESTRICT ON UPDATE NO ACTION,
     CONSTRAINT scan_uploader_exists FOREIGN KEY (uploadedById) REFERENCES \`user\`(id) ON DELETE RESTRICT ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE spectrum (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     name varchar(120) NOT NULL,
     sourceFileId uuid NOT NULL,
     mapping longtext NOT NULL,
     points int NOT NULL,
     wavelengthNm mediumblob NOT NULL,
     \`values\` mediumblob NOT NULL,
     totalIrradianceWM2 double NOT NULL,
     uploadedAt datetime(3) NOT NULL,
     uploadedById uuid NOT NULL,
     PRIMARY KEY (id),
     UNIQUE INDEX spectrum_name_in_project (projectId, name),
     CONSTRAINT spectrum_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT spectrum_source_file_exists FOREIGN KEY (sourceFileId) REFERENCES source_file (id) ON DELETE RESTRICT ON UPDATE NO ACTION,
     CONSTRAINT spectrum_uploader_exists FOREIGN KEY (uploadedById) REFERENCES \`user\`(id) ON DELETE RESTRICT ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
]
