-- Findings: every version of each, the newest last. NULL: there is no such figure. The numbers of
-- kind, state, component, cause, role and quantity are those of the enumerations in thermo/.

CREATE TABLE finding (
  number            INTEGER PRIMARY KEY,
  id                TEXT NOT NULL,
  machine           TEXT NOT NULL,
  kind              INTEGER NOT NULL,
  state             INTEGER NOT NULL,
  size              REAL NOT NULL,
  size_u            REAL NOT NULL,
  onset_ms          INTEGER NOT NULL,
  onset_earliest_ms INTEGER NOT NULL,
  onset_latest_ms   INTEGER NOT NULL,
  first_seen_ms     INTEGER NOT NULL,
  confirmed_ms      INTEGER,
  ended_ms          INTEGER,
  updated_ms        INTEGER NOT NULL,
  extra_energy_J    REAL NOT NULL,
  extra_energy_u_J  REAL NOT NULL,
  compared_share    REAL NOT NULL,
  extra_cost        REAL,
  extra_cost_u      REAL,
  currency          TEXT NOT NULL,
  extra_co2_kg      REAL,
  extra_co2_u_kg    REAL,
  component         INTEGER,
  component_share   REAL NOT NULL,
  component_share_u REAL NOT NULL,
  cause_is_clear    INTEGER NOT NULL,
  baseline          TEXT NOT NULL,
  UNIQUE (id, updated_ms, state)
) STRICT;

CREATE INDEX finding_updated ON finding (updated_ms);

-- Change of each component's lost work.
CREATE TABLE finding_loss (
  finding   INTEGER NOT NULL REFERENCES finding (number),
  component INTEGER NOT NULL,
  change_W  REAL NOT NULL,
  u_W       REAL NOT NULL,
  PRIMARY KEY (finding, component)
) STRICT;

-- rank 0: the most likely one.
CREATE TABLE finding_cause (
  finding     INTEGER NOT NULL REFERENCES finding (number),
  rank        INTEGER NOT NULL,
  cause       INTEGER NOT NULL,
  role        INTEGER,
  probability REAL NOT NULL,
  amount_SI   REAL NOT NULL,
  amount_u_SI REAL NOT NULL,
  PRIMARY KEY (finding, rank)
) STRICT;

CREATE TABLE finding_sensor (
  finding INTEGER NOT NULL REFERENCES finding (number),
  rank    INTEGER NOT NULL,
  role    INTEGER NOT NULL,
  PRIMARY KEY (finding, rank)
) STRICT;

CREATE TABLE finding_evidence (
  finding   INTEGER NOT NULL REFERENCES finding (number),
  rank      INTEGER NOT NULL,
  quantity  INTEGER NOT NULL,
  before_SI REAL NOT NULL,
  after_SI  REAL NOT NULL,
  u_SI      REAL NOT NULL,
  PRIMARY KEY (finding, rank)
) STRICT;
