import { sql } from 'drizzle-orm';
import { check, foreignKey, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flagColumn, isFlag } from './columns.ts';
import { households } from './households.ts';
import { documents } from './papers.ts';

const householdId = () =>
  text('household_id')
    .notNull()
    .references(() => households.id, { onDelete: 'cascade' });

/** A statement file of the log in progress; its bytes are a held document. */
export const draftFiles = sqliteTable(
  'draft_files',
  {
    householdId: householdId(),
    documentId: text('document_id').notNull(),
    ordinal: integer('ordinal').notNull(),
    keepGoodRows: flagColumn('keep_good_rows').notNull(),
    /** The file as a table, and its faults: validated JSON. */
    sourceTable: text('source_table').notNull(),
    faults: text('faults').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.documentId] }),
    foreignKey({
      columns: [table.householdId, table.documentId],
      foreignColumns: [documents.householdId, documents.id],
    }).onDelete('cascade'),
    check('draft_files_keep', isFlag(table.keepGoodRows)),
    check('draft_files_json', sql`json_valid(${table.sourceTable}) AND json_valid(${table.faults})`),
  ],
);

export const draftStatements = sqliteTable(
  'draft_statements',
  {
    householdId: householdId(),
    key: text('key').notNull(),
    ordinal: integer('ordinal').notNull(),
    /** Null when typed. */
    documentId: text('document_id'),
    firstRow: integer('first_row'),
    lastRow: integer('last_row'),
    /** As it is to be posted, and as it was read (null when typed): validated JSON. */
    statement: text('statement').notNull(),
    asRead: text('as_read'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.key] }),
    foreignKey({
      columns: [table.householdId, table.documentId],
      foreignColumns: [documents.householdId, documents.id],
    }).onDelete('cascade'),
    check('draft_statements_json', sql`json_valid(${table.statement})`),
    check('draft_statements_read', sql`(${table.documentId} IS NULL) = (${table.asRead} IS NULL)`),
  ],
);

/** A production, import or export file as it is read under its mapping. */
export const draftReadings = sqliteTable(
  'draft_readings',
  {
    householdId: householdId(),
    key: text('key').notNull(),
    ordinal: integer('ordinal').notNull(),
    documentId: text('document_id').notNull(),
    keepGoodRows: flagColumn('keep_good_rows').notNull(),
    channel: text('channel', { enum: ['production', 'monitor', 'import', 'export'] }).notNull(),
    /** The whole reading: validated JSON. */
    reading: text('reading').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.key] }),
    foreignKey({
      columns: [table.householdId, table.documentId],
      foreignColumns: [documents.householdId, documents.id],
    }).onDelete('cascade'),
    check('draft_readings_keep', isFlag(table.keepGoodRows)),
    check('draft_readings_json', sql`json_valid(${table.reading})`),
  ],
);
