import type { MigrationInterface, QueryRunner } from 'typeorm'

/** Optical descriptions of devices, and scenarios. */
export class Scenarios1764590300000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    for (const table of TABLES) await runner.query(table)
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of ['scenario', 'what_if_model']) await runner.query(`DROP TABLE ${table}`)
  }
}

const TABLES = [
  `CREATE TABLE what_if_model (
     deviceId uuid NOT NULL,
     description longtext NOT NULL,
     version int NOT NULL,
     PRIMARY KEY (deviceId),
     CONSTRAINT what_if_model_device_exists FOREIGN KEY (deviceId) REFERENCES device (id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE scenario (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     deviceId uuid NOT NULL,
     name varchar(120) NOT NULL,
     reason varchar(1000) NOT NULL,
     model varchar(20) NOT NULL,
     \`change\` longtext NOT NULL,
     spectrum longtext NOT NULL,
     result longtext NOT NULL,
     inputs longtext NOT NULL,
     madeById uuid NOT NULL,
     madeAt datetime(3) NOT NULL,
     version int NOT NULL,
     deletedAt datetime(3) NULL,
     PRIMARY KEY (id),
     INDEX scenario_of_device (deviceId, deletedAt),
     CONSTRAINT scenario_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT scenario_device_exists FOREIGN KEY (deviceId) REFERENCES device (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT scenario_maker_exists FOREIGN KEY (madeById) REFERENCES \`user\`(id) ON DELETE RESTRICT ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
]
