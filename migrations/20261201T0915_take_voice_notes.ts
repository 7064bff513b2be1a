import { type Kysely, sql } from 'kysely'
import { oneOf } from './support/protect'

const LOG_KINDS = [
  'symptom',
  'code',
  'codesUnreadable',
  'codesCleared',
  'check',
  'couldNot',
  'reading',
  'swap',
  'fix',
  'proofRun',
  'photo',
  'voice',
  'note',
  'people',
  'wayOut',
  'correction',
]
const MIMES = ['image/jpeg', 'image/webp', 'image/png', 'audio/webm', 'audio/ogg', 'audio/mp4']

/** Voice notes (R8): a kind of entry, and files of their own beside the photos, under the same rules. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    alter table log_entry drop constraint log_entry_kind_check;
    alter table log_entry add constraint log_entry_kind_check check (kind in ${oneOf(LOG_KINDS)});
    alter table photo drop constraint photo_mime_check;
    alter table photo add constraint photo_mime_check check (mime in ${oneOf(MIMES)});
    create index log_entry_file on log_entry
      (shop_id, (coalesce(body -> 'photo' ->> 'hash', body -> 'voice' ->> 'hash',
        body -> 'context' ->> 'photo')))
      where kind in ('photo', 'voice', 'code');
    drop index log_entry_photo
  `.execute(db)
}
