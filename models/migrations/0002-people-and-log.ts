import type { Migration } from './migration';

/** People, devices, the change log, and the reference trees that curves are fitted on. */
export const peopleAndLog: Migration = {
  name: '0002-people-and-log',
  statements: [
    `CREATE TABLE users (
        id TEXT NOT NULL PRIMARY KEY,
        email TEXT NOT NULL UNIQUE CHECK (email = lower(email)),
        name TEXT NOT NULL,
        password_hash TEXT NOT NULL,
        admin TINYINT(1) NOT NULL DEFAULT 0,
        disabled TINYINT(1) NOT NULL DEFAULT 0,
        token_version INTEGER NOT NULL DEFAULT 0,
        created_at TEXT NOT NULL
    )`,
    `CREATE TABLE memberships (
        user_id TEXT NOT NULL REFERENCES users (id),
        project_id TEXT NOT NULL REFERENCES projects (id),
        role TEXT NOT NULL,
        created_at TEXT NOT NULL,
        PRIMARY KEY (user_id, project_id)
    )`,
    `CREATE INDEX memberships_project ON memberships (project_id)`,
    `CREATE TABLE sessions (
        id TEXT NOT NULL PRIMARY KEY,
        user_id TEXT NOT NULL REFERENCES users (id),
        token_version INTEGER NOT NULL,
        created_at TEXT NOT NULL,
        last_seen_at TEXT NOT NULL,
        revoked_at TEXT
    )`,
    `CREATE INDEX sessions_user ON sessions (user_id)`,
    `CREATE TABLE devices (
        id TEXT NOT NULL PRIMARY KEY,
        user_id TEXT REFERENCES users (id),
        first_seen_at TEXT NOT NULL,
        last_seen_at TEXT NOT NULL,
        last_seq INTEGER NOT NULL,
        last_hash TEXT NOT NULL,
        lost TINYINT(1) NOT NULL DEFAULT 0
    )`,
    `CREATE TABLE change_log (
        cursor INTEGER PRIMARY KEY AUTOINCREMENT,
        op_id TEXT NOT NULL UNIQUE,
        device_id TEXT NOT NULL REFERENCES devices (id),
        seq INTEGER NOT NULL,
        project_id TEXT NOT NULL,
        author_id TEXT NOT NULL,
        entity TEXT NOT NULL,
        record_id TEXT NOT NULL,
        kind TEXT NOT NULL,
        group_name TEXT NOT NULL,
        fields JSON NOT NULL,
        reason TEXT,
        base_cursor INTEGER NOT NULL,
        schema_v INTEGER NOT NULL,
        app_v TEXT NOT NULL,
        wall_clock TEXT NOT NULL,
        received_at TEXT NOT NULL,
        prev_hash TEXT NOT NULL,
        hash TEXT NOT NULL,
        state TEXT NOT NULL,
        state_reason TEXT,
        raw TEXT NOT NULL,
        UNIQUE (device_id, seq)
    )`,
    `CREATE INDEX change_log_project ON change_log (project_id, cursor)`,
    `CREATE INDEX change_log_record ON change_log (record_id, cursor)`,
    `CREATE TABLE applied_operations (
        device_id TEXT NOT NULL REFERENCES devices (id),
        seq INTEGER NOT NULL,
        op_id TEXT NOT NULL,
        hash TEXT NOT NULL,
        cursor INTEGER NOT NULL REFERENCES change_log (cursor),
        state TEXT NOT NULL,
        reason TEXT,
        PRIMARY KEY (device_id, seq)
    )`,
    `CREATE INDEX applied_operations_op ON applied_operations (op_id)`,
    `CREATE TABLE record_groups (
        record_id TEXT NOT NULL,
        group_name TEXT NOT NULL,
        entity TEXT NOT NULL,
        project_id TEXT NOT NULL REFERENCES projects (id),
        last_cursor INTEGER NOT NULL REFERENCES change_log (cursor),
        last_device_id TEXT NOT NULL REFERENCES devices (id),
        last_author_id TEXT NOT NULL,
        last_op_id TEXT NOT NULL,
        last_wall_clock TEXT NOT NULL,
        PRIMARY KEY (record_id, group_name)
    )`,
    `CREATE INDEX record_groups_project ON record_groups (project_id)`,
    `CREATE TABLE server_meta (
        key TEXT NOT NULL PRIMARY KEY,
        value TEXT NOT NULL
    )`,
    `CREATE TABLE import_batches (
        id TEXT NOT NULL PRIMARY KEY,
        project_id TEXT NOT NULL REFERENCES projects (id),
        file_name TEXT NOT NULL,
        sha256 TEXT NOT NULL,
        rows INTEGER NOT NULL,
        dbh_unit TEXT NOT NULL,
        length_unit TEXT NOT NULL,
        imported_by_id TEXT NOT NULL REFERENCES users (id),
        imported_at TEXT NOT NULL,
        note TEXT NOT NULL
    )`,
    `CREATE INDEX import_batches_project ON import_batches (project_id)`,
    `CREATE TABLE reference_trees (
        id TEXT NOT NULL PRIMARY KEY,
        project_id TEXT NOT NULL REFERENCES projects (id),
        batch_id TEXT NOT NULL REFERENCES import_batches (id),
        row INTEGER NOT NULL,
        species_id TEXT NOT NULL REFERENCES species_entries (id),
        plot_label TEXT,
        dbh_digits TEXT NOT NULL,
        dbh_unit TEXT NOT NULL,
        dbh_cm DOUBLE PRECISION NOT NULL,
        height_digits TEXT NOT NULL,
        height_unit TEXT NOT NULL,
        height_m DOUBLE PRECISION NOT NULL,
        UNIQUE (batch_id, row)
    )`,
    `CREATE INDEX reference_trees_project ON reference_trees (project_id)`,
  ],
};
