-- Runs and their states:  queued -> running -> succeeded | failed | cancelled,  queued -> cancelled,  running -> queued (a worker that stopped in good order).

create table run (
  id               text collate "C" not null primary key check (length(id) = 36),
  sequence         bigint           not null unique check (sequence >= 1),
  portfolio        text collate "C" not null references portfolio (id),
  kind             text collate "C" not null check (kind in ('nightly', 'request')),
  recorded         bigint           not null check (recorded in (0, 1)),
  as_of            text collate "C" not null check (length(as_of) = 10),
  -- the first instant after the local date as_of
  date_ends_at     bigint           not null,
  revision         bigint           not null,
  -- a scenario laid over the revision, JSON
  overlay          bytea,
  seed             bigint           not null check (seed >= 0),
  iterations       bigint           not null check (iterations >= 1),
  replaces         text collate "C" references run (id),
  due_date         text collate "C" check (length(due_date) = 10),
  state            text collate "C" not null check (state in ('queued', 'running', 'succeeded', 'failed', 'cancelled')),
  attempt          bigint           not null default 0 check (attempt >= 0),
  cancel_requested bigint           not null default 0 check (cancel_requested in (0, 1)),
  -- rises with every claim; a worker's writes carry the number it was given
  fence            bigint           not null default 0 check (fence >= 0),
  owner            text collate "C",
  lease_until      bigint,
  trace_parent     text collate "C",
  engine_version   text collate "C",
  inputs_digest    text collate "C" check (length(inputs_digest) = 64),
  result_digest    text collate "C" check (length(result_digest) = 64),
  queued_at        bigint           not null,
  started_at       bigint,
  finished_at      bigint,
  requested_by     text collate "C" not null references api_key (id),
  warnings         text collate "C",
  error            text collate "C",
  foreign key (portfolio, revision) references revision (portfolio, number),
  unique (portfolio, due_date),
  check ((kind = 'nightly') = (due_date is not null)),
  check (recorded = 0 or overlay is null),
  check (replaces is null or recorded = 1),
  check ((state = 'running') = (lease_until is not null)),
  check ((state = 'running') = (owner is not null)),
  check ((state in ('succeeded', 'failed', 'cancelled')) = (finished_at is not null)),
  check (state in ('queued', 'cancelled') or started_at is not null),
  check ((started_at is null) = (attempt = 0)),
  check ((attempt = 0) = (fence = 0)),
  check ((state = 'succeeded') = (result_digest is not null)),
  check ((state = 'succeeded') = (inputs_digest is not null)),
  check ((state = 'succeeded') = (warnings is not null)),
  check ((state = 'failed') = (error is not null)),
  check (state <> 'cancelled' or cancel_requested = 1)
);

create index run_by_portfolio on run (portfolio, sequence);
create index run_by_date on run (portfolio, as_of);
create index run_served on run (portfolio, started_at);
create index run_by_state on run (state, sequence);

-- The run that stands for a date.
create table series_point (
  portfolio text collate "C" not null references portfolio (id),
  as_of     text collate "C" not null,
  run       text collate "C" not null unique references run (id),
  primary key (portfolio, as_of)
);
