import type { QueryInterface } from "sequelize";

const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";

export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.sequelize.query(`CREATE TABLE customers (
    id ${ID} NOT NULL PRIMARY KEY,
    name VARCHAR(200) NOT NULL,
    email VARCHAR(254) NOT NULL,
    phone VARCHAR(60) NULL,
    contact VARCHAR(200) NULL,
    created_at DATETIME(6) NOT NULL
  ) ENGINE=InnoDB`);
  // Counts the cases of a year in the workshop's time zone.
  await q.sequelize.query(`CREATE TABLE case_counters (
    year SMALLINT UNSIGNED NOT NULL PRIMARY KEY,
    last_number INT UNSIGNED NOT NULL
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE cases (
    id ${ID} NOT NULL PRIMARY KEY,
    ref VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    customer_id ${ID} NOT NULL,
    damage TEXT NOT NULL,
    note TEXT NULL,
    due_on DATE NULL,
    received_at DATETIME(6) NOT NULL,
    created_by ${ID} NOT NULL,
    closed_at DATETIME(6) NULL,
    closed_reason TEXT NULL,
    UNIQUE KEY cases_ref (ref),
    KEY cases_due (due_on),
    CONSTRAINT cases_customer FOREIGN KEY (customer_id) REFERENCES customers (id),
    CONSTRAINT cases_created_by FOREIGN KEY (created_by) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE drives (
    id ${ID} NOT NULL PRIMARY KEY,
    case_id ${ID} NOT NULL,
    position SMALLINT UNSIGNED NOT NULL,
    part_number VARCHAR(120) NULL,
    model VARCHAR(120) NULL,
    serial VARCHAR(120) NULL,
    interface VARCHAR(60) NULL,
    created_at DATETIME(6) NOT NULL,
    UNIQUE KEY drives_position (case_id, position),
    KEY drives_serial (serial),
    CONSTRAINT drives_case FOREIGN KEY (case_id) REFERENCES cases (id),
    CONSTRAINT drives_named CHECK (COALESCE(part_number, model, serial) IS NOT NULL)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE boards (
    id ${ID} NOT NULL PRIMARY KEY,
    drive_id ${ID} NOT NULL,
    role ENUM('original','donor') NOT NULL,
    board_number VARCHAR(120) NOT NULL,
    revision VARCHAR(60) NULL,
    controller_marking VARCHAR(120) NULL,
    motor_driver_marking VARCHAR(120) NULL,
    \`condition\` TEXT NULL,
    fit_reason TEXT NULL,
    created_at DATETIME(6) NOT NULL,
    KEY boards_number (board_number),
    CONSTRAINT boards_drive FOREIGN KEY (drive_id) REFERENCES drives (id)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE chips (
    id ${ID} NOT NULL PRIMARY KEY,
    board_id ${ID} NOT NULL,
    designator VARCHAR(16) NOT NULL,
    bus ENUM('spi','i2c','microwire','other') NOT NULL,
    size_bytes INT UNSIGNED NOT NULL,
    size_source ENUM('marking','id','sfdp','typed') NOT NULL,
    supply_millivolts INT UNSIGNED NULL,
    package VARCHAR(60) NULL,
    marking VARCHAR(120) NULL,
    holds VARCHAR(120) NULL,
    needs_transfer BOOLEAN NOT NULL,
    paired_with_id ${ID} NULL,
    created_at DATETIME(6) NOT NULL,
    UNIQUE KEY chips_designator (board_id, designator),
    UNIQUE KEY chips_pair (paired_with_id),
    CONSTRAINT chips_board FOREIGN KEY (board_id) REFERENCES boards (id),
    CONSTRAINT chips_paired FOREIGN KEY (paired_with_id) REFERENCES chips (id),
    CONSTRAINT chips_size CHECK (size_bytes BETWEEN 1 AND 67108864)
  ) ENGINE=InnoDB`);
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  for (const table of ["chips", "boards", "drives", "cases", "case_counters", "customers"]) await q.dropTable(table);
}
