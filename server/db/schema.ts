import type { Generated } from 'kysely'

/** The tables as the migrations leave them; column meanings and limits stand in the migrations. */

export interface PersonTable {
  id: string
  email: string | null
  display_name: string
  password_hash: string | null
  is_observer: Generated<0 | 1>
  is_administrator: Generated<0 | 1>
  state: Generated<'active' | 'closed'>
  created_at: string
}

export interface SessionTable {
  id: string
  person_id: string
  created_at: string
  last_seen_at: string
  expires_at: string
  revoked_at: string | null
}

export interface ProgrammeTable {
  id: string
  name: string
  description: Generated<string>
  least_measures: Generated<number>
  least_observers: Generated<number>
  least_arc_turns: Generated<number>
  needs_second_consent: Generated<0 | 1>
  created_at: string
}

export interface ProgrammeRoleTable {
  programme_id: string
  person_id: string
  role: 'coordinator'
  created_at: string
}

export interface InvitationTable {
  id: string
  token_hash: string
  email: string | null
  is_observer: Generated<0 | 1>
  is_administrator: Generated<0 | 1>
  coordinator_of: string | null
  created_by: string | null
  created_at: string
  expires_at: string
  used_at: string | null
  used_by: string | null
}

export interface ApiTokenTable {
  id: string
  person_id: string
  name: string
  token_hash: string
  created_at: string
  last_used_at: string | null
  revoked_at: string | null
}

export interface StationTable {
  id: string
  code: string | null
  name: string
  longitude_east_deg: number | null
  latitude_deg: number | null
  height_m: number | null
  rho_cos_phi: number | null
  rho_sin_phi: number | null
  is_private: Generated<0 | 1>
  owner_id: string | null
  created_at: string
}

export interface InstrumentTable {
  id: string
  name: string
  method: string | null
  aperture_m: number | null
  owner_id: string | null
  created_at: string
}

export interface ObserverTable {
  id: string
  name: string
  name_key: string
  kind: Generated<'person' | 'literature' | 'pseudonym'>
  person_id: string | null
  created_at: string
}

export interface CalibrationTable {
  id: string
  observer_id: string
  instrument_id: string | null
  scale_arcsec_per_px: number | null
  sigma_scale_arcsec_per_px: number | null
  orientation_deg: number | null
  sigma_orientation_deg: number | null
  valid_from: string
  valid_to: string | null
  created_at: string
}

export interface SourceTable {
  id: string
  kind: 'own' | 'literature' | 'archive'
  title: string
  doi: string | null
  bibcode: string | null
  page: string | null
  created_at: string
}

export interface SystemTable {
  id: string
  name: string
  ra_deg: number | null
  dec_deg: number | null
  pm_ra_cosdec_mas_per_yr: number | null
  pm_dec_mas_per_yr: number | null
  parallax_mas: number | null
  sigma_parallax_mas: number | null
  created_at: string
}

export interface TargetTable {
  id: string
  programme_id: string
  kind: 'relative' | 'equatorial' | 'plane'
  name: string
  system_id: string | null
  component_a: string | null
  component_b: string | null
  radius_unit: string | null
  diameter_scale_arcmin: number | null
  caution: Generated<'none' | 'sun'>
  remarks: Generated<string>
  created_at: string
}

export interface TargetNameTable {
  id: string
  target_id: string
  name: string
  name_key: string
}

export interface RawFileTable {
  sha256: string
  bytes: Buffer
  byte_count: number
  created_at: string
}

export interface BatchTable {
  id: string
  number: number
  owner_id: string
  kind: 'relative' | 'equatorial' | 'plane'
  file_name: string
  raw_sha256: string
  default_target_id: string | null
  column_mapping: string
  reading: string
  version: Generated<number>
  created_at: string
  discarded_at: string | null
}

export interface BatchTargetTable {
  id: string
  batch_id: string
  target_id: string
  state: 'draft' | 'sent' | 'accepted' | 'returned' | 'declined' | 'withdrawn'
  version: Generated<number>
  sent_at: string | null
  ruled_at: string | null
}

export interface BatchRowTable {
  id: string
  batch_id: string
  row_number: number
  state: 'good' | 'bad' | 'already-here' | 'sent'
  target_id: string | null
  original_cells: string
  mended_cells: string | null
  parsed: string | null
  problems: string
}

export interface MeasureTable {
  id: string
  lineage_id: string
  revision: Generated<number>
  superseded_at: string | null
  target_id: string
  batch_id: string
  batch_row_id: string
  kind: 'relative' | 'equatorial' | 'plane'
  duplicate_key: string
  original_cells: string
  epoch_yr: number | null
  time_utc: string | null
  theta_deg: number | null
  rho_arcsec: number | null
  rho_limit_arcsec: number | null
  sigma_theta_deg: number | null
  sigma_rho_arcsec: number | null
  east_arcsec: number | null
  north_arcsec: number | null
  sigma_east_arcsec: number | null
  sigma_north_arcsec: number | null
  ra_deg: number | null
  dec_deg: number | null
  sigma_ra_cosdec_arcsec: number | null
  sigma_dec_arcsec: number | null
  sigma_time_s: number | null
  longitude_east_deg: number | null
  latitude_deg: number | null
  height_m: number | null
  rho_cos_phi: number | null
  rho_sin_phi: number | null
  star_catalogue: string | null
  tracklet: string | null
  phi_deg: number | null
  r: number | null
  sigma_r: number | null
  diameter_arcmin: number | null
  sigma_diameter_arcmin: number | null
  correlation: number | null
  nights: number | null
  theta_frame: string | null
  quadrant: 'stated' | 'ambiguous' | null
  method: string | null
  aperture_m: number | null
  mag_a: number | null
  mag_b: number | null
  delta_mag: number | null
  mag: number | null
  band: string | null
  components: string | null
  station_id: string | null
  station_text: string | null
  instrument_id: string | null
  source_id: string | null
  source_text: string | null
  remarks: string | null
  author_id: string
  reason: string | null
  created_at: string
}

export interface MeasureObserverTable {
  measure_id: string
  observer_id: string
  position: Generated<number>
}

export interface FitTable {
  id: string
  target_id: string
  number: number
  state: 'queued' | 'running' | 'done' | 'failed' | 'accepted' | 'declined' | 'superseded' | 'published'
  version: Generated<number>
  requested_by: string | null
  cause: 'batch-sent' | 'refit' | 'requeued' | 'merge'
  request: string
  input_hash: string
  engine_version: string
  seed: number
  base_fit_id: string | null
  result: string | null
  refusal: string | null
  created_at: string
  finished_at: string | null
  headline: Generated<string | null>
}

export interface FitMeasureTable {
  fit_id: string
  measure_id: string
  role: 'used' | 'set-aside' | 'not-fitted'
  reason: string | null
  decided_by: string | null
  is_new: Generated<0 | 1>
}

export interface FitBatchTargetTable {
  fit_id: string
  batch_target_id: string
}

export interface RulingTable {
  id: string
  fit_id: string
  decision: 'accept' | 'return' | 'decline' | 'consent'
  reason: string
  person_id: string
  created_at: string
}

export interface CommentTable {
  id: string
  person_id: string
  measure_id: string | null
  fit_id: string | null
  batch_id: string | null
  body: string
  created_at: string
}

export interface EditionTable {
  id: string
  target_id: string
  number: number
  fit_id: string
  state: 'published' | 'superseded' | 'withdrawn'
  version: Generated<number>
  snapshot: string
  sha256: string
  summary: string
  what_changed: string
  published_by: string
  published_at: string
  withdrawn_at: string | null
  withdrawn_by: string | null
  withdrawal_reason: string | null
}

export interface FollowTable {
  person_id: string
  target_id: string
  created_at: string
}

export interface MailStopTable {
  id: string
  person_id: string
  target_id: string | null
  created_at: string
}

export interface MailOutTable {
  id: string
  person_id: string
  target_id: string | null
  template: string
  dedupe_key: string
  subject: string
  body_text: string
  unsubscribe_hash: string | null
  unsubscribe_url: string | null
  state: 'queued' | 'sent' | 'stopped' | 'dead'
  attempts: Generated<number>
  last_error: string | null
  created_at: string
  sent_at: string | null
}

export interface JobTable {
  id: string
  name: string
  payload: string
  unique_key: string | null
  state: 'queued' | 'running' | 'done' | 'dead' | 'cancelled'
  attempts: Generated<number>
  run_after: string
  lease_token: string | null
  lease_until: string | null
  progress_fraction: Generated<number>
  progress_stage: string | null
  elapsed_ms: number | null
  last_error: string | null
  created_at: string
  finished_at: string | null
}

export interface AuditEventTable {
  seq: Generated<number>
  at: string
  actor_id: string | null
  actor_kind: 'person' | 'system' | 'command-line'
  event: string
  subject_kind: string
  subject_id: string
  target_id: string | null
  detail: string
}

export interface Database {
  person: PersonTable
  session: SessionTable
  programme: ProgrammeTable
  programme_role: ProgrammeRoleTable
  invitation: InvitationTable
  api_token: ApiTokenTable
  station: StationTable
  instrument: InstrumentTable
  observer: ObserverTable
  calibration: CalibrationTable
  source: SourceTable
  system: SystemTable
  target: TargetTable
  target_name: TargetNameTable
  raw_file: RawFileTable
  batch: BatchTable
  batch_target: BatchTargetTable
  batch_row: BatchRowTable
  measure: MeasureTable
  measure_observer: MeasureObserverTable
  fit: FitTable
  fit_measure: FitMeasureTable
  fit_batch_target: FitBatchTargetTable
  ruling: RulingTable
  comment: CommentTable
  edition: EditionTable
  follow: FollowTable
  mail_stop: MailStopTable
  mail_out: MailOutTable
  job: JobTable
  audit_event: AuditEventTable
}
