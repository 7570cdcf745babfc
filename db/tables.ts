import type { ColumnType, Generated, Insertable, JSONColumnType, Selectable } from 'kysely';
import type { KeyTables } from './keys.ts';
import type { PeopleTables } from './people.ts';

/** A number that PostgreSQL sends as text so that no digit is lost. */
type Bigint = ColumnType<string, string | number | bigint, string | number | bigint>;
type Json<T> = JSONColumnType<T & object>;
type Time = Date;

export interface EconomyTable {
  code: string;
  name: string;
  name_in_text: string;
  currency: string;
  frequency: 'monthly' | 'quarterly' | 'annual';
  contact: string;
  created_at: Time;
  created_by: string;
}

export interface SeriesTable {
  id: string;
  economy_code: string;
  concept: 'money' | 'prices' | 'activity';
  title: string;
  unit: string;
  timing: 'end' | 'average' | null;
  adjustment: 'adjusted' | 'unadjusted';
  source: string;
  licence: string;
  serve_values: boolean;
  created_at: Time;
}

export interface VintageTable {
  id: Generated<string>;
  economy_code: string;
  file_name: string;
  file_hash: string;
  file_size: Bigint;
  note: ColumnType<string, string | undefined, string>;
  source_published_at: Time;
  known_from: Time;
  public_from: Time | null;
  loaded_by: string;
}

export interface VintageSeriesTable {
  vintage_id: string;
  series_id: string;
  start: string;
  /** The digits of the file, exactly. */
  values: string[];
}

export interface SpecificationTable {
  id: Generated<string>;
  economy_code: string;
  version: number;
  assumptions: Json<unknown>;
  reason: string;
  holds_from: string;
  created_at: Time;
  created_by: string;
  approved_at: Time | null;
  approved_by: string | null;
}

export interface ReleaseTable {
  id: string;
  economy_code: string;
  period: string;
  revision: number;
  state: 'draft' | 'in_review' | 'approved' | 'scheduled';
  headline: ColumnType<string, string | undefined, string>;
  explainer: ColumnType<string, string | undefined, string>;
  vintage_id: string;
  specification_id: string;
  request: Json<unknown> | null;
  result: Json<unknown> | null;
  computed_at: Time | null;
  method_version: string | null;
  build: string | null;
  version: Generated<number>;
  created_at: Time;
  created_by: string;
  submitted_at: Time | null;
  submitted_by: string | null;
  returned_reason: string | null;
  approved_at: Time | null;
  approved_by: string | null;
  scheduled_for: Time | null;
  scheduled_by: string | null;
  ready_for: Time | null;
}

export interface ReleaseContributorTable {
  release_id: string;
  person_id: string;
  part: 'data' | 'specification' | 'words';
}

export interface ReleaseValueTable {
  release_id: string;
  indicator: string;
  period: string;
  value: number | null;
  lower: number | null;
  upper: number | null;
}

export interface ArtefactTable {
  hash: string;
  media_type: string;
  size: Bigint;
  created_at: Time;
}

export interface ReleaseArtefactTable {
  release_id: string;
  name: string;
  artefact_hash: string;
}

export interface MomentTable {
  visible_from: Time;
  ready: Generated<boolean>;
  rendered_at: Time | null;
}

export interface PublishedTable {
  address: string;
  visible_from: Time;
  artefact_hash: string;
  status: number;
  headers: Json<Record<string, string>>;
  drawn_at: Time;
  build: string | null;
  generation: Bigint;
}

export interface PublicationTable {
  singleton: Generated<boolean>;
  generation: Bigint;
}

export interface AnnouncementTable {
  economy_code: string;
  period: string;
  announced_at: Time;
  due_at: Time;
  reason: ColumnType<string, string | undefined, string>;
  announced_by: string;
}

export interface AuditTable {
  id: Generated<string>;
  at: Time;
  person_id: string | null;
  role: string;
  action: string;
  subject: string;
  detail: Json<unknown>;
  previous_hash: string;
  hash: string;
}

export interface DemoSeedTable {
  singleton: Generated<boolean>;
  started_at: Time;
  finished_at: Time | null;
}

export interface Database extends PeopleTables, KeyTables {
  economy: EconomyTable;
  series: SeriesTable;
  vintage: VintageTable;
  vintage_series: VintageSeriesTable;
  specification: SpecificationTable;
  release: ReleaseTable;
  release_contributor: ReleaseContributorTable;
  release_value: ReleaseValueTable;
  artefact: ArtefactTable;
  release_artefact: ReleaseArtefactTable;
  moment: MomentTable;
  published: PublishedTable;
  publication: PublicationTable;
  announcement: AnnouncementTable;
  audit: AuditTable;
  demo_seed: DemoSeedTable;
}

export type Release = Selectable<ReleaseTable>;
export type Economy = Selectable<EconomyTable>;
export type Series = Selectable<SeriesTable>;
export type Vintage = Selectable<VintageTable>;
export type Specification = Selectable<SpecificationTable>;
export type NewPublished = Insertable<PublishedTable>;
