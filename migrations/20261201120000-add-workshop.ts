import type { QueryInterface } from "sequelize";

const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";
const HASH = "BINARY(32)";

export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  const run = (sql: string) => q.sequelize.query(sql);
  await run("ALTER TABLE customers ADD COLUMN company VARCHAR(200) NULL, ADD COLUMN return_address TEXT NULL");
  // A request is a case whose parcel is not here yet; nobody of the workshop made it.
  await run(`ALTER TABLE cases
    MODIFY received_at DATETIME(6) NULL,
    MODIFY created_by ${ID} NULL,
    ADD COLUMN requested_at DATETIME(6) NULL,
    ADD COLUMN waiting_for ENUM('customer','donor','parts','workshop','other') NULL,
    ADD COLUMN waiting_since DATETIME(6) NULL,
    ADD COLUMN hold_reason TEXT NULL,
    ADD COLUMN returned_at DATETIME(6) NULL,
    ADD COLUMN closed_kind ENUM('returned','without-transfer','cancelled') NULL,
    ADD COLUMN erase_on DATE NULL,
    ADD CONSTRAINT cases_begun CHECK (received_at IS NOT NULL OR requested_at IS NOT NULL)`);
  await run(`CREATE TABLE requests (
    id ${ID} NOT NULL PRIMARY KEY,
    case_id ${ID} NOT NULL,
    token_hash ${HASH} NOT NULL,
    answers MEDIUMTEXT NOT NULL,
    address_digest ${HASH} NOT NULL,
    requested_at DATETIME(6) NOT NULL,
    expires_at DATETIME(6) NOT NULL,
    deletion_asked_at DATETIME(6) NULL,
    deletion_message TEXT NULL,
    UNIQUE KEY requests_case (case_id),
    UNIQUE KEY requests_token (token_hash),
    KEY requests_address (address_digest, requested_at),
    CONSTRAINT requests_case FOREIGN KEY (case_id) REFERENCES cases (id)
  ) ENGINE=InnoDB`);
  await run(`CREATE TABLE receipts (
    id ${ID} NOT NULL PRIMARY KEY,
    case_id ${ID} NOT NULL,
    carrier VARCHAR(120) NULL,
    tracking VARCHAR(120) NULL,
    seal_as_sent ENUM('yes','no','none') NOT NULL,
    seal_number VARCHAR(80) NULL,
    small_board ENUM('yes','no','none') NOT NULL,
    parcel_condition TEXT NOT NULL,
    accessories TEXT NULL,
    differs TEXT NULL,
    by_user_id ${ID} NOT NULL,
    at DATETIME(6) NOT NULL,
    UNIQUE KEY receipts_case (case_id),
    CONSTRAINT receipts_case FOREIGN KEY (case_id) REFERENCES cases (id),
    CONSTRAINT receipts_by FOREIGN KEY (by_user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await run(`CREATE TABLE shelf_boards (
    id ${ID} NOT NULL PRIMARY KEY,
    number INT UNSIGNED NOT NULL,
    board_number VARCHAR(120) NOT NULL,
    revision VARCHAR(60) NULL,
    controller_marking VARCHAR(120) NULL,
    motor_driver_marking VARCHAR(120) NULL,
    chips TEXT NOT NULL,
    origin VARCHAR(200) NULL,
    \`condition\` TEXT NULL,
    place VARCHAR(120) NULL,
    note TEXT NULL,
    reserved_case_id ${ID} NULL,
    taken_board_id ${ID} NULL,
    taken_at DATETIME(6) NULL,
    retired_at DATETIME(6) NULL,
    retired_reason TEXT NULL,
    created_by ${ID} NOT NULL,
    created_at DATETIME(6) NOT NULL,
    UNIQUE KEY shelf_boards_number (number),
    UNIQUE KEY shelf_boards_taken (taken_board_id),
    KEY shelf_boards_fit (board_number, revision),
    CONSTRAINT shelf_boards_case FOREIGN KEY (reserved_case_id) REFERENCES cases (id),
    CONSTRAINT shelf_boards_board FOREIGN KEY (taken_board_id) REFERENCES boards (id),
    CONSTRAINT shelf_boards_by FOREIGN KEY (created_by) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await run("ALTER TABLE drives ADD COLUMN encryption ENUM('none','suspected','yes') NULL, ADD COLUMN capacity VARCHAR(40) NULL, ADD COLUMN made VARCHAR(40) NULL, ADD COLUMN firmware VARCHAR(60) NULL");
  await run("ALTER TABLE boards ADD COLUMN data_in_controller BOOLEAN NOT NULL DEFAULT FALSE");
  await run(`ALTER TABLE chips ADD COLUMN place_x SMALLINT UNSIGNED NULL, ADD COLUMN place_y SMALLINT UNSIGNED NULL,
    ADD CONSTRAINT chips_place CHECK ((place_x IS NULL) = (place_y IS NULL) AND COALESCE(place_x, 0) <= 1000 AND COALESCE(place_y, 0) <= 1000)`);
  await run(`CREATE TABLE photos (
    id ${ID} NOT NULL PRIMARY KEY,
    case_id ${ID} NULL,
    subject_type ENUM('case','drive','board','chip','shelf-board') NOT NULL,
    subject_id ${ID} NOT NULL,
    kind ENUM('photo','document') NOT NULL,
    sha256 ${HASH} NOT NULL,
    size_bytes INT UNSIGNED NOT NULL,
    media_type VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    file_name VARCHAR(255) NOT NULL,
    caption VARCHAR(300) NULL,
    width INT UNSIGNED NULL,
    height INT UNSIGNED NULL,
    had_location BOOLEAN NOT NULL DEFAULT FALSE,
    by_user_id ${ID} NULL,
    stored_at DATETIME(6) NOT NULL,
    KEY photos_subject (subject_type, subject_id, stored_at),
    KEY photos_case (case_id),
    KEY photos_digest (sha256),
    CONSTRAINT photos_case FOREIGN KEY (case_id) REFERENCES cases (id),
    CONSTRAINT photos_by FOREIGN KEY (by_user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await run(`CREATE TABLE notes (
    id ${ID} NOT NULL PRIMARY KEY,
    case_id ${ID} NOT NULL,
    drive_id ${ID} NULL,
    text TEXT NOT NULL,
    happened_at DATETIME(6) NULL,
    corrects_id ${ID} NULL,
    by_user_id ${ID} NOT NULL,
    at DATETIME(6) NOT NULL,
    KEY notes_case (case_id, at),
    CONSTRAINT notes_case FOREIGN KEY (case_id) REFERENCES cases (id),
    CONSTRAINT notes_drive FOREIGN KEY (drive_id) REFERENCES drives (id),
    CONSTRAINT notes_corrects FOREIGN KEY (corrects_id) REFERENCES notes (id),
    CONSTRAINT notes_by FOREIGN KEY (by_user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await run(`CREATE TABLE start_up_tests (
    id ${ID} NOT NULL PRIMARY KEY,
    drive_id ${ID} NOT NULL,
    spins BOOLEAN NOT NULL,
    ready BOOLEAN NOT NULL,
    reported_serial VARCHAR(120) NULL,
    serial_matches BOOLEAN NULL,
    attempts SMALLINT UNSIGNED NOT NULL,
    note TEXT NULL,
    by_user_id ${ID} NOT NULL,
    at DATETIME(6) NOT NULL,
    KEY start_up_tests_drive (drive_id, at),
    CONSTRAINT start_up_tests_drive FOREIGN KEY (drive_id) REFERENCES drives (id),
    CONSTRAINT start_up_tests_by FOREIGN KEY (by_user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await run(`CREATE TABLE case_returns (
    id ${ID} NOT NULL PRIMARY KEY,
    case_id ${ID} NOT NULL,
    items TEXT NOT NULL,
    to_person VARCHAR(120) NOT NULL,
    carrier VARCHAR(120) NULL,
    tracking VARCHAR(120) NULL,
    seal_number VARCHAR(80) NULL,
    note TEXT NULL,
    by_user_id ${ID} NOT NULL,
    at DATETIME(6) NOT NULL,
    UNIQUE KEY case_returns_case (case_id),
    CONSTRAINT case_returns_case FOREIGN KEY (case_id) REFERENCES cases (id),
    CONSTRAINT case_returns_by FOREIGN KEY (by_user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  // Rows outlive what they tell of: an erased image keeps its digest, its size and what was found on it.
  await run(`ALTER TABLE images
    MODIFY state ENUM('sound','damaged','missing','erased') NOT NULL DEFAULT 'sound',
    ADD COLUMN erased_at DATETIME(6) NULL,
    ADD COLUMN erased_cause ENUM('due','asked-for') NULL,
    ADD KEY images_state (state),
    ADD CONSTRAINT images_erased CHECK ((state = 'erased') = (erased_at IS NOT NULL) AND (erased_at IS NULL) = (erased_cause IS NULL))`);
  await run("ALTER TABLE cases ADD COLUMN kept_until DATE NULL, ADD COLUMN kept_reason TEXT NULL, ADD COLUMN erased_at DATETIME(6) NULL, ADD KEY cases_erase (erase_on)");
  await run(`ALTER TABLE requests ADD COLUMN deletion_answered_at DATETIME(6) NULL, ADD COLUMN deletion_answer TEXT NULL, ADD COLUMN deletion_answered_by ${ID} NULL,
    ADD CONSTRAINT requests_answered_by FOREIGN KEY (deletion_answered_by) REFERENCES users (id)`);
  await run(`CREATE TABLE erasures (
    id ${ID} NOT NULL PRIMARY KEY,
    case_id ${ID} NOT NULL,
    cause ENUM('due','asked-for') NOT NULL,
    reason TEXT NOT NULL,
    erased MEDIUMTEXT NOT NULL,
    kept MEDIUMTEXT NOT NULL,
    images INT UNSIGNED NOT NULL,
    photos INT UNSIGNED NOT NULL,
    bytes BIGINT UNSIGNED NOT NULL,
    by_user_id ${ID} NOT NULL,
    at DATETIME(6) NOT NULL,
    KEY erasures_case (case_id, at),
    CONSTRAINT erasures_case FOREIGN KEY (case_id) REFERENCES cases (id),
    CONSTRAINT erasures_by FOREIGN KEY (by_user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await run("ALTER TABLE mails ADD COLUMN kind VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'other'");
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  const run = (sql: string) => q.sequelize.query(sql);
  await run("ALTER TABLE mails DROP COLUMN kind");
  await q.dropTable("erasures");
  await run("ALTER TABLE requests DROP FOREIGN KEY requests_answered_by");
  await run("ALTER TABLE requests DROP COLUMN deletion_answered_at, DROP COLUMN deletion_answer, DROP COLUMN deletion_answered_by");
  await run("ALTER TABLE cases DROP KEY cases_erase, DROP COLUMN kept_until, DROP COLUMN kept_reason, DROP COLUMN erased_at");
  await run("ALTER TABLE images DROP CONSTRAINT images_erased, DROP KEY images_state, DROP COLUMN erased_at, DROP COLUMN erased_cause, MODIFY state ENUM('sound','damaged','missing') NOT NULL DEFAULT 'sound'");
  for (const table of ["case_returns", "start_up_tests", "notes", "photos", "shelf_boards", "receipts", "requests"]) await q.dropTable(table);
  await run("ALTER TABLE chips DROP CONSTRAINT chips_place, DROP COLUMN place_x, DROP COLUMN place_y");
  await run("ALTER TABLE boards DROP COLUMN data_in_controller");
  await run("ALTER TABLE drives DROP COLUMN encryption, DROP COLUMN capacity, DROP COLUMN made, DROP COLUMN firmware");
  await run(`ALTER TABLE cases DROP CONSTRAINT cases_begun, DROP COLUMN requested_at, DROP COLUMN waiting_for, DROP COLUMN waiting_since,
    DROP COLUMN hold_reason, DROP COLUMN returned_at, DROP COLUMN closed_kind, DROP COLUMN erase_on`);
  await run("ALTER TABLE customers DROP COLUMN company, DROP COLUMN return_address");
}
