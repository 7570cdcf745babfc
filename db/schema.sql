CREATE FUNCTION public.refuse_change() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      raise exception '% is written once and never changed', tg_table_name
        using errcode = 'restrict_violation';
    end $$;

CREATE FUNCTION public.refuse_change_of_scheduled() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      if exists (select from release where id = old.release_id and state = 'scheduled') then
        raise exception '% of a scheduled or published release never changes', tg_table_name
          using errcode = 'restrict_violation';
      end if;
      return old;
    end $$;

CREATE TABLE public.account (
    id text NOT NULL,
    account_id text NOT NULL,
    provider_id text NOT NULL,
    person_id text NOT NULL,
    access_token text,
    refresh_token text,
    id_token text,
    access_token_expires_at timestamp with time zone,
    refresh_token_expires_at timestamp with time zone,
    scope text,
    password text,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    updated_at timestamp with time zone NOT NULL
);

CREATE TABLE public.announcement (
    economy_code text NOT NULL,
    period text NOT NULL,
    announced_at timestamp with time zone NOT NULL,
    due_at timestamp with time zone NOT NULL,
    reason text DEFAULT ''::text NOT NULL,
    announced_by text NOT NULL
);

CREATE TABLE public.api_key (
    id text NOT NULL,
    config_id text NOT NULL,
    name text,
    start text,
    person_id text NOT NULL,
    prefix text,
    key text NOT NULL,
    refill_interval integer,
    refill_amount integer,
    last_refill_at timestamp with time zone,
    enabled boolean,
    rate_limit_enabled boolean,
    rate_limit_time_window integer,
    rate_limit_max integer,
    request_count integer,
    remaining integer,
    last_request timestamp with time zone,
    expires_at timestamp with time zone,
    created_at timestamp with time zone NOT NULL,
    updated_at timestamp with time zone NOT NULL,
    permissions text,
    metadata text,
    plan text DEFAULT 'open'::text NOT NULL
);

CREATE TABLE public.artefact (
    hash text NOT NULL,
    media_type text NOT NULL,
    size bigint NOT NULL,
    created_at timestamp with time zone NOT NULL,
    CONSTRAINT artefact_hash_check CHECK ((hash ~ '^[0-9a-f]{64}$'::text))
);

CREATE TABLE public.audit (
    id bigint NOT NULL,
    at timestamp with time zone NOT NULL,
    person_id text,
    role text NOT NULL,
    action text NOT NULL,
    subject text NOT NULL,
    detail jsonb NOT NULL,
    previous_hash text NOT NULL,
    hash text NOT NULL
);

ALTER TABLE public.audit ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.audit_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.demo_seed (
    singleton boolean DEFAULT true NOT NULL,
    started_at timestamp with time zone NOT NULL,
    finished_at timestamp with time zone,
    CONSTRAINT demo_seed_singleton_check CHECK (singleton)
);

CREATE TABLE public.economy (
    code text NOT NULL,
    name text NOT NULL,
    name_in_text text NOT NULL,
    currency text NOT NULL,
    frequency text NOT NULL,
    contact text NOT NULL,
    created_at timestamp with time zone NOT NULL,
    created_by text NOT NULL,
    CONSTRAINT economy_code_check CHECK ((code ~ '^[A-Z]{3}$'::text)),
    CONSTRAINT economy_contact_check CHECK ((contact <> ''::text)),
    CONSTRAINT economy_currency_check CHECK ((currency <> ''::text)),
    CONSTRAINT economy_frequency_check CHECK ((frequency = ANY (ARRAY['monthly'::text, 'quarterly'::text, 'annual'::text]))),
    CONSTRAINT economy_name_check CHECK ((name <> ''::text)),
    CONSTRAINT economy_name_in_text_check CHECK ((name_in_text <> ''::text))
);

CREATE TABLE public.key_usage (
    key_id text NOT NULL,
    span text NOT NULL,
    starts_at timestamp with time zone NOT NULL,
    calls integer NOT NULL,
    CONSTRAINT key_usage_calls_check CHECK ((calls >= 0)),
    CONSTRAINT key_usage_span_check CHECK ((span = ANY (ARRAY['minute'::text, 'month'::text])))
);

CREATE TABLE public.kysely_migration (
    name character varying(255) NOT NULL,
    "timestamp" character varying(255) NOT NULL
);

CREATE TABLE public.kysely_migration_lock (
    id character varying(255) NOT NULL,
    is_locked integer DEFAULT 0 NOT NULL
);

CREATE TABLE public.moment (
    visible_from timestamp with time zone NOT NULL,
    ready boolean DEFAULT false NOT NULL,
    rendered_at timestamp with time zone
);

CREATE TABLE public.person (
    id text NOT NULL,
    name text NOT NULL,
    email text NOT NULL,
    email_verified boolean NOT NULL,
    image text,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    updated_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    role text DEFAULT 'subscriber'::text NOT NULL,
    banned boolean DEFAULT false,
    ban_reason text,
    ban_expires timestamp with time zone,
    CONSTRAINT person_email_check CHECK ((email = lower(email))),
    CONSTRAINT person_name_check CHECK ((name <> ''::text)),
    CONSTRAINT person_role_check CHECK ((role = ANY (ARRAY['subscriber'::text, 'editor'::text, 'reviewer'::text, 'administrator'::text])))
);

CREATE TABLE public.plan (
    name text NOT NULL,
    per_minute integer NOT NULL,
    per_month integer NOT NULL,
    CONSTRAINT plan_name_check CHECK ((name <> ''::text)),
    CONSTRAINT plan_per_minute_check CHECK ((per_minute > 0)),
    CONSTRAINT plan_per_month_check CHECK ((per_month > 0))
);

CREATE TABLE public.publication (
    singleton boolean DEFAULT true NOT NULL,
    generation bigint NOT NULL,
    CONSTRAINT publication_singleton_check CHECK (singleton)
);

CREATE TABLE public.published (
    address text NOT NULL,
    visible_from timestamp with time zone NOT NULL,
    artefact_hash text NOT NULL,
    status smallint NOT NULL,
    headers jsonb NOT NULL,
    drawn_at timestamp with time zone NOT NULL,
    build text,
    generation bigint NOT NULL,
    CONSTRAINT published_address_check CHECK ((address ~~ '/%'::text))
);

CREATE TABLE public.release (
    id text NOT NULL,
    economy_code text NOT NULL,
    period text NOT NULL,
    revision integer NOT NULL,
    state text NOT NULL,
    headline text DEFAULT ''::text NOT NULL,
    explainer text DEFAULT ''::text NOT NULL,
    vintage_id bigint NOT NULL,
    specification_id bigint NOT NULL,
    request json,
    result json,
    computed_at timestamp with time zone,
    method_version text,
    build text,
    version integer DEFAULT 1 NOT NULL,
    created_at timestamp with time zone NOT NULL,
    created_by text NOT NULL,
    submitted_at timestamp with time zone,
    submitted_by text,
    returned_reason text,
    approved_at timestamp with time zone,
    approved_by text,
    scheduled_for timestamp with time zone,
    scheduled_by text,
    ready_for timestamp with time zone,
    CONSTRAINT release_check CHECK (((state <> 'scheduled'::text) OR ((scheduled_for IS NOT NULL) AND (approved_by IS NOT NULL)))),
    CONSTRAINT release_revision_check CHECK ((revision > 0)),
    CONSTRAINT release_state_check CHECK ((state = ANY (ARRAY['draft'::text, 'in_review'::text, 'approved'::text, 'scheduled'::text])))
);

CREATE TABLE public.release_artefact (
    release_id text NOT NULL,
    name text NOT NULL,
    artefact_hash text NOT NULL
);

CREATE TABLE public.release_contributor (
    release_id text NOT NULL,
    person_id text NOT NULL,
    part text NOT NULL,
    CONSTRAINT release_contributor_part_check CHECK ((part = ANY (ARRAY['data'::text, 'specification'::text, 'words'::text])))
);

CREATE TABLE public.release_value (
    release_id text NOT NULL,
    indicator text NOT NULL,
    period text NOT NULL,
    value double precision,
    lower double precision,
    upper double precision
);

CREATE TABLE public.series (
    id text NOT NULL,
    economy_code text NOT NULL,
    concept text NOT NULL,
    title text NOT NULL,
    unit text NOT NULL,
    timing text,
    adjustment text NOT NULL,
    source text NOT NULL,
    licence text NOT NULL,
    serve_values boolean NOT NULL,
    created_at timestamp with time zone NOT NULL,
    CONSTRAINT series_adjustment_check CHECK ((adjustment = ANY (ARRAY['adjusted'::text, 'unadjusted'::text]))),
    CONSTRAINT series_concept_check CHECK ((concept = ANY (ARRAY['money'::text, 'prices'::text, 'activity'::text]))),
    CONSTRAINT series_id_check CHECK ((id ~ '^[A-Z]{3}\.[a-z_]+\.[MQA]$'::text)),
    CONSTRAINT series_timing_check CHECK ((timing = ANY (ARRAY['end'::text, 'average'::text])))
);

CREATE TABLE public.session (
    id text NOT NULL,
    expires_at timestamp with time zone NOT NULL,
    token text NOT NULL,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    updated_at timestamp with time zone NOT NULL,
    ip_address text,
    user_agent text,
    person_id text NOT NULL,
    impersonated_by text
);

CREATE TABLE public.specification (
    id bigint NOT NULL,
    economy_code text NOT NULL,
    version integer NOT NULL,
    assumptions jsonb NOT NULL,
    reason text NOT NULL,
    holds_from text NOT NULL,
    created_at timestamp with time zone NOT NULL,
    created_by text NOT NULL,
    approved_at timestamp with time zone,
    approved_by text,
    CONSTRAINT specification_check CHECK ((approved_by IS DISTINCT FROM created_by)),
    CONSTRAINT specification_reason_check CHECK ((reason <> ''::text)),
    CONSTRAINT specification_version_check CHECK ((version > 0))
);

ALTER TABLE public.specification ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.specification_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.verification (
    id text NOT NULL,
    identifier text NOT NULL,
    value text NOT NULL,
    expires_at timestamp with time zone NOT NULL,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    updated_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL
);

CREATE TABLE public.vintage (
    id bigint NOT NULL,
    economy_code text NOT NULL,
    file_name text NOT NULL,
    file_hash text NOT NULL,
    file_size bigint NOT NULL,
    note text DEFAULT ''::text NOT NULL,
    source_published_at timestamp with time zone NOT NULL,
    known_from timestamp with time zone NOT NULL,
    public_from timestamp with time zone,
    loaded_by text NOT NULL,
    CONSTRAINT vintage_file_hash_check CHECK ((file_hash ~ '^[0-9a-f]{64}$'::text)),
    CONSTRAINT vintage_file_size_check CHECK ((file_size > 0))
);

ALTER TABLE public.vintage ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.vintage_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.vintage_series (
    vintage_id bigint NOT NULL,
    series_id text NOT NULL,
    start text NOT NULL,
    "values" numeric[] NOT NULL,
    CONSTRAINT vintage_series_values_check CHECK ((cardinality("values") > 0))
);

ALTER TABLE ONLY public.account
    ADD CONSTRAINT account_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.announcement
    ADD CONSTRAINT announcement_pkey PRIMARY KEY (economy_code, period, announced_at);

ALTER TABLE ONLY public.api_key
    ADD CONSTRAINT api_key_key_key UNIQUE (key);

ALTER TABLE ONLY public.api_key
    ADD CONSTRAINT api_key_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.artefact
    ADD CONSTRAINT artefact_pkey PRIMARY KEY (hash);

ALTER TABLE ONLY public.audit
    ADD CONSTRAINT audit_hash_key UNIQUE (hash);

ALTER TABLE ONLY public.audit
    ADD CONSTRAINT audit_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.demo_seed
    ADD CONSTRAINT demo_seed_pkey PRIMARY KEY (singleton);

ALTER TABLE ONLY public.economy
    ADD CONSTRAINT economy_pkey PRIMARY KEY (code);

ALTER TABLE ONLY public.key_usage
    ADD CONSTRAINT key_usage_pkey PRIMARY KEY (key_id, span, starts_at);

ALTER TABLE ONLY public.kysely_migration_lock
    ADD CONSTRAINT kysely_migration_lock_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.kysely_migration
    ADD CONSTRAINT kysely_migration_pkey PRIMARY KEY (name);

ALTER TABLE ONLY public.moment
    ADD CONSTRAINT moment_pkey PRIMARY KEY (visible_from);

ALTER TABLE ONLY public.person
    ADD CONSTRAINT person_email_key UNIQUE (email);

ALTER TABLE ONLY public.person
    ADD CONSTRAINT person_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.plan
    ADD CONSTRAINT plan_pkey PRIMARY KEY (name);

ALTER TABLE ONLY public.publication
    ADD CONSTRAINT publication_pkey PRIMARY KEY (singleton);

ALTER TABLE ONLY public.published
    ADD CONSTRAINT published_pkey PRIMARY KEY (address, visible_from);

ALTER TABLE ONLY public.release_artefact
    ADD CONSTRAINT release_artefact_pkey PRIMARY KEY (release_id, name);

ALTER TABLE ONLY public.release_contributor
    ADD CONSTRAINT release_contributor_pkey PRIMARY KEY (release_id, person_id, part);

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_economy_code_period_revision_key UNIQUE (economy_code, period, revision);

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.release_value
    ADD CONSTRAINT release_value_pkey PRIMARY KEY (release_id, indicator, period);

ALTER TABLE ONLY public.series
    ADD CONSTRAINT series_economy_code_concept_key UNIQUE (economy_code, concept);

ALTER TABLE ONLY public.series
    ADD CONSTRAINT series_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.session
    ADD CONSTRAINT session_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.session
    ADD CONSTRAINT session_token_key UNIQUE (token);

ALTER TABLE ONLY public.specification
    ADD CONSTRAINT specification_economy_code_version_key UNIQUE (economy_code, version);

ALTER TABLE ONLY public.specification
    ADD CONSTRAINT specification_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.verification
    ADD CONSTRAINT verification_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.vintage
    ADD CONSTRAINT vintage_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.vintage_series
    ADD CONSTRAINT vintage_series_pkey PRIMARY KEY (vintage_id, series_id);

CREATE INDEX account_by_person ON public.account USING btree (person_id);

CREATE INDEX api_key_by_config ON public.api_key USING btree (config_id);

CREATE INDEX api_key_by_person ON public.api_key USING btree (person_id);

CREATE INDEX audit_by_subject ON public.audit USING btree (subject, id);

CREATE INDEX key_usage_by_time ON public.key_usage USING btree (span, starts_at);

CREATE INDEX published_by_generation ON public.published USING btree (generation);

CREATE INDEX published_by_time ON public.published USING btree (visible_from);

CREATE INDEX release_by_time ON public.release USING btree (ready_for) WHERE (state = 'scheduled'::text);

CREATE INDEX session_by_person ON public.session USING btree (person_id);

CREATE INDEX verification_by_identifier ON public.verification USING btree (identifier);

CREATE INDEX vintage_by_economy ON public.vintage USING btree (economy_code, source_published_at);

CREATE TRIGGER audit_is_final BEFORE DELETE OR UPDATE OR TRUNCATE ON public.audit FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();

CREATE TRIGGER release_artefact_stays BEFORE DELETE OR UPDATE ON public.release_artefact FOR EACH ROW EXECUTE FUNCTION public.refuse_change_of_scheduled();

CREATE TRIGGER release_value_is_final BEFORE UPDATE OR TRUNCATE ON public.release_value FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();

CREATE TRIGGER release_value_stays BEFORE DELETE ON public.release_value FOR EACH ROW EXECUTE FUNCTION public.refuse_change_of_scheduled();

CREATE TRIGGER vintage_series_is_final BEFORE DELETE OR UPDATE OR TRUNCATE ON public.vintage_series FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();

ALTER TABLE ONLY public.account
    ADD CONSTRAINT account_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.announcement
    ADD CONSTRAINT announcement_announced_by_fkey FOREIGN KEY (announced_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.announcement
    ADD CONSTRAINT announcement_economy_code_fkey FOREIGN KEY (economy_code) REFERENCES public.economy(code);

ALTER TABLE ONLY public.api_key
    ADD CONSTRAINT api_key_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.api_key
    ADD CONSTRAINT api_key_plan_fkey FOREIGN KEY (plan) REFERENCES public.plan(name);

ALTER TABLE ONLY public.audit
    ADD CONSTRAINT audit_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id);

ALTER TABLE ONLY public.economy
    ADD CONSTRAINT economy_created_by_fkey FOREIGN KEY (created_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.key_usage
    ADD CONSTRAINT key_usage_key_id_fkey FOREIGN KEY (key_id) REFERENCES public.api_key(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.published
    ADD CONSTRAINT published_artefact_hash_fkey FOREIGN KEY (artefact_hash) REFERENCES public.artefact(hash);

ALTER TABLE ONLY public.published
    ADD CONSTRAINT published_visible_from_fkey FOREIGN KEY (visible_from) REFERENCES public.moment(visible_from) ON DELETE CASCADE;

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_approved_by_fkey FOREIGN KEY (approved_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.release_artefact
    ADD CONSTRAINT release_artefact_artefact_hash_fkey FOREIGN KEY (artefact_hash) REFERENCES public.artefact(hash);

ALTER TABLE ONLY public.release_artefact
    ADD CONSTRAINT release_artefact_release_id_fkey FOREIGN KEY (release_id) REFERENCES public.release(id);

ALTER TABLE ONLY public.release_contributor
    ADD CONSTRAINT release_contributor_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id);

ALTER TABLE ONLY public.release_contributor
    ADD CONSTRAINT release_contributor_release_id_fkey FOREIGN KEY (release_id) REFERENCES public.release(id);

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_created_by_fkey FOREIGN KEY (created_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_economy_code_fkey FOREIGN KEY (economy_code) REFERENCES public.economy(code);

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_scheduled_by_fkey FOREIGN KEY (scheduled_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_specification_id_fkey FOREIGN KEY (specification_id) REFERENCES public.specification(id);

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_submitted_by_fkey FOREIGN KEY (submitted_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.release_value
    ADD CONSTRAINT release_value_release_id_fkey FOREIGN KEY (release_id) REFERENCES public.release(id);

ALTER TABLE ONLY public.release
    ADD CONSTRAINT release_vintage_id_fkey FOREIGN KEY (vintage_id) REFERENCES public.vintage(id);

ALTER TABLE ONLY public.series
    ADD CONSTRAINT series_economy_code_fkey FOREIGN KEY (economy_code) REFERENCES public.economy(code);

ALTER TABLE ONLY public.session
    ADD CONSTRAINT session_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.specification
    ADD CONSTRAINT specification_approved_by_fkey FOREIGN KEY (approved_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.specification
    ADD CONSTRAINT specification_created_by_fkey FOREIGN KEY (created_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.specification
    ADD CONSTRAINT specification_economy_code_fkey FOREIGN KEY (economy_code) REFERENCES public.economy(code);

ALTER TABLE ONLY public.vintage
    ADD CONSTRAINT vintage_economy_code_fkey FOREIGN KEY (economy_code) REFERENCES public.economy(code);

ALTER TABLE ONLY public.vintage
    ADD CONSTRAINT vintage_loaded_by_fkey FOREIGN KEY (loaded_by) REFERENCES public.person(id);

ALTER TABLE ONLY public.vintage_series
    ADD CONSTRAINT vintage_series_series_id_fkey FOREIGN KEY (series_id) REFERENCES public.series(id);

ALTER TABLE ONLY public.vintage_series
    ADD CONSTRAINT vintage_series_vintage_id_fkey FOREIGN KEY (vintage_id) REFERENCES public.vintage(id);
