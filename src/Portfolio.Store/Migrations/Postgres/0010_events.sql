-- Events for those who listen: each has an id of its own; who wants which, and what became of every delivery.

alter table outbox add column id text collate "C" unique check (id <> '');

-- the one project it is about: what grants limited to projects reach
alter table outbox add column project text collate "C" check (project <> '');

update outbox set id = replace(gen_random_uuid()::text, '-', '');

alter table outbox alter column id set not null;

-- How far events have been handed to subscriptions: one row.
create table event_cursor (
  one             bigint           not null primary key check (one = 1),
  through         bigint           not null check (through >= 0)
);

insert into event_cursor (one, through) select 1, coalesce(max(sequence), 0) from outbox;

-- What is told once and never again: its name is taken in the transaction that tells it.
create table event_marker (
  portfolio       text collate "C" not null references portfolio (id),
  name            text collate "C" not null check (name <> ''),
  at              bigint           not null,
  primary key (portfolio, name)
);

create table subscription (
  portfolio       text collate "C" not null references portfolio (id),
  id              text collate "C" not null check (id <> ''),
  url             text collate "C" not null check (url <> ''),
  -- JSON array of what is wanted
  events          text collate "C" not null,
  active          bigint           not null check (active in (0, 1)),
  -- why the server has ended it: its target answered 410
  ended           text collate "C" check (ended in ('gone')),
  -- read back to sign with: whoever reads this file can sign
  secret          text collate "C" not null check (secret <> ''),
  previous_secret text collate "C",
  previous_until  bigint,
  -- events up to this one came before it was made, or made active again
  after_event     bigint           not null check (after_event >= 0),
  -- attempts that failed since the last that did not
  failures        bigint           not null default 0 check (failures >= 0),
  created_at      bigint           not null,
  changed_at      bigint           not null,
  created_by      text collate "C" not null references api_key (id),
  primary key (portfolio, id),
  check ((previous_secret is null) = (previous_until is null)),
  check (ended is null or active = 0)
);

create table delivery (
  id              text collate "C" not null primary key check (id <> ''),
  portfolio       text collate "C" not null,
  subscription    text collate "C" not null,
  event           bigint           not null references outbox (sequence),
  state           text collate "C" not null check (state in ('waiting', 'sending', 'delivered', 'dead')),
  attempt         bigint           not null default 0 check (attempt >= 0),
  -- rises with every claim; a sender's writes carry the number it was given
  fence           bigint           not null default 0 check (fence >= 0),
  owner           text collate "C",
  lease_until     bigint,
  next_attempt_at bigint,
  give_up_at      bigint           not null,
  last_attempt_at bigint,
  last_status     bigint           check (last_status between 100 and 599),
  last_error      text collate "C",
  delivered_at    bigint,
  unique (portfolio, subscription, event),
  foreign key (portfolio, subscription) references subscription (portfolio, id) on delete cascade,
  check ((state = 'sending') = (lease_until is not null)),
  check ((state = 'sending') = (owner is not null)),
  check ((state = 'waiting') = (next_attempt_at is not null)),
  check ((state = 'delivered') = (delivered_at is not null)),
  check (state <> 'dead' or last_error is not null)
);

create index delivery_due on delivery (state, next_attempt_at);
create index delivery_by_event on delivery (event);
