#include "storage/finding_table.h"

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <string>

namespace lostwork {
namespace {

std::int64_t ms(Instant time) {
  return time.time_since_epoch().count();
}

bool is_finite(const Measured& value) {
  return std::isfinite(value.value) && std::isfinite(value.u);
}

bool is_finite(const std::optional<Measured>& value) {
  return !value || is_finite(*value);
}

// What binds an optional figure: the figure, or NULL.
template <class Insert>
void set_if(Insert& update, std::int64_t number, const std::optional<Measured>& value) {
  if (value) {
    update.run(number, value->value, value->u);
  }
}

class FindingWriter {
 public:
  explicit FindingWriter(Database& database)
      : database_{database},
        insert_{database,
                "INSERT OR IGNORE INTO finding (id, machine, kind, state, size, size_u, onset_ms, "
                "onset_earliest_ms, onset_latest_ms, first_seen_ms, updated_ms, extra_energy_J, "
                "extra_energy_u_J, compared_share, currency, component_share, component_share_u, "
                "cause_is_clear, baseline) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, "
                "?12, ?13, ?14, ?15, ?16, ?17, ?18, ?19)"},
        find_{database,
              "SELECT number FROM finding WHERE id = ?1 AND updated_ms = ?2 AND state = ?3"},
        confirmed_{database, "UPDATE finding SET confirmed_ms = ?2 WHERE number = ?1"},
        ended_{database, "UPDATE finding SET ended_ms = ?2 WHERE number = ?1"},
        cost_{database, "UPDATE finding SET extra_cost = ?2, extra_cost_u = ?3 WHERE number = ?1"},
        co2_{database,
             "UPDATE finding SET extra_co2_kg = ?2, extra_co2_u_kg = ?3 WHERE number = ?1"},
        component_{database, "UPDATE finding SET component = ?2 WHERE number = ?1"},
        loss_{database,
              "INSERT INTO finding_loss (finding, component, change_W, u_W) "
              "VALUES (?1, ?2, ?3, ?4)"},
        cause_{database,
               "INSERT INTO finding_cause (finding, rank, cause, probability, amount_SI, "
               "amount_u_SI) VALUES (?1, ?2, ?3, ?4, ?5, ?6)"},
        cause_role_{database,
                    "UPDATE finding_cause SET role = ?3 WHERE finding = ?1 AND rank = ?2"},
        sensor_{database, "INSERT INTO finding_sensor (finding, rank, role) VALUES (?1, ?2, ?3)"},
        evidence_{database,
                  "INSERT INTO finding_evidence (finding, rank, quantity, before_SI, after_SI, "
                  "u_SI) VALUES (?1, ?2, ?3, ?4, ?5, ?6)"} {}

  void write(const Finding& f) {
    insert_.run(f.id, f.machine, static_cast<int>(f.kind), static_cast<int>(f.state), f.size.value,
                f.size.u, ms(f.onset.best), ms(f.onset.earliest), ms(f.onset.latest),
                ms(f.first_seen), ms(f.updated), f.extra_energy_J.value, f.extra_energy_J.u,
                f.compared_share, f.currency, f.component_share.value, f.component_share.u,
                f.cause_is_clear ? 1 : 0, f.baseline_id);
    if (database_.rows_changed() == 0) {
      return;
    }
    const std::int64_t number = number_of(f);
    if (f.confirmed) {
      confirmed_.run(number, ms(*f.confirmed));
    }
    if (f.ended) {
      ended_.run(number, ms(*f.ended));
    }
    if (f.component) {
      component_.run(number, static_cast<int>(*f.component));
    }
    set_if(cost_, number, f.extra_cost);
    set_if(co2_, number, f.extra_co2_kg);
    write_lists(number, f);
  }

 private:
  [[nodiscard]] std::int64_t number_of(const Finding& f) {
    Rows rows{find_, f.id, ms(f.updated), static_cast<int>(f.state)};
    return rows.next() ? rows.integer(0) : 0;
  }

  void write_lists(std::int64_t number, const Finding& f) {
    for (std::size_t i = 0; i < f.lost_change_W.size(); ++i) {
      if (const auto& change = f.lost_change_W.at(i)) {
        loss_.run(number, static_cast<std::int64_t>(i), change->value, change->u);
      }
    }
    std::int64_t rank = 0;
    for (const RankedCause& cause : f.causes) {
      cause_.run(number, rank, static_cast<int>(cause.cause), cause.probability,
                 cause.amount_SI.value, cause.amount_SI.u);
      if (cause.role) {
        cause_role_.run(number, rank, static_cast<int>(*cause.role));
      }
      ++rank;
    }
    rank = 0;
    for (const Role role : f.suspect_sensors) {
      sensor_.run(number, rank++, static_cast<int>(role));
    }
    rank = 0;
    for (const Evidence& evidence : f.evidence) {
      evidence_.run(number, rank++, static_cast<int>(evidence.quantity), evidence.before_SI,
                    evidence.after_SI, evidence.u_SI);
    }
  }

  Database& database_;
  Statement insert_;
  Statement find_;
  Statement confirmed_;
  Statement ended_;
  Statement cost_;
  Statement co2_;
  Statement component_;
  Statement loss_;
  Statement cause_;
  Statement cause_role_;
  Statement sensor_;
  Statement evidence_;
};

// A number that this program does not know becomes the first enumerator: it cannot come from it.
template <class Enumeration>
Enumeration enumerator(std::int64_t number) {
  return number >= 0 && number < static_cast<std::int64_t>(Enumeration::count)
             ? static_cast<Enumeration>(number)
             : Enumeration{};
}

std::optional<Instant> instant_or_none(const Rows& rows, int column) {
  return rows.is_null(column) ? std::nullopt : std::optional{Instant{Span{rows.integer(column)}}};
}

std::optional<Measured> measured_or_none(const Rows& rows, int column) {
  return rows.is_null(column)
             ? std::nullopt
             : std::optional{
                   Measured{.value = rows.real(column), .u = rows.real(column + 1)}
  };
}

class FindingReader {
 public:
  explicit FindingReader(Database& database)
      : loss_{database, "SELECT component, change_W, u_W FROM finding_loss WHERE finding = ?1"},
        cause_{database,
               "SELECT cause, role, probability, amount_SI, amount_u_SI FROM finding_cause "
               "WHERE finding = ?1 ORDER BY rank"},
        sensor_{database, "SELECT role FROM finding_sensor WHERE finding = ?1 ORDER BY rank"},
        evidence_{database,
                  "SELECT quantity, before_SI, after_SI, u_SI FROM finding_evidence "
                  "WHERE finding = ?1 ORDER BY rank"} {}

  // The columns of the table in their order.
  [[nodiscard]] Finding read(const Rows& rows) {
    Finding out;
    out.id = rows.text(1);
    out.machine = rows.text(2);
    out.kind = enumerator<FindingKind>(rows.integer(3));
    out.state = enumerator<FindingState>(rows.integer(4));
    out.size = {.value = rows.real(5), .u = rows.real(6)};
    out.onset = {.best = Instant{Span{rows.integer(7)}},
                 .earliest = Instant{Span{rows.integer(8)}},
                 .latest = Instant{Span{rows.integer(9)}}};
    out.first_seen = Instant{Span{rows.integer(10)}};
    out.confirmed = instant_or_none(rows, 11);
    out.ended = instant_or_none(rows, 12);
    out.updated = Instant{Span{rows.integer(13)}};
    out.extra_energy_J = {.value = rows.real(14), .u = rows.real(15)};
    out.compared_share = rows.real(16);
    out.extra_cost = measured_or_none(rows, 17);
    out.currency = rows.text(19);
    out.extra_co2_kg = measured_or_none(rows, 20);
    if (!rows.is_null(22)) {
      out.component = enumerator<Component>(rows.integer(22));
    }
    out.component_share = {.value = rows.real(23), .u = rows.real(24)};
    out.cause_is_clear = rows.integer(25) != 0;
    out.baseline_id = rows.text(26);
    read_lists(rows.integer(0), out);
    return out;
  }

 private:
  void read_lists(std::int64_t number, Finding& out) {
    for (Rows rows{loss_, number}; rows.next();) {
      out.lost_change_W.at(static_cast<std::size_t>(enumerator<Component>(rows.integer(0)))) =
          Measured{.value = rows.real(1), .u = rows.real(2)};
    }
    for (Rows rows{cause_, number}; rows.next();) {
      RankedCause cause{
          .cause = enumerator<Cause>(rows.integer(0)),
          .role = {                },
          .probability = rows.real(2),
          .amount_SI = { .value = rows.real(3),.u = rows.real(4)},
      };
      if (!rows.is_null(1)) {
        cause.role = enumerator<Role>(rows.integer(1));
      }
      out.causes.push_back(cause);
    }
    for (Rows rows{sensor_, number}; rows.next();) {
      out.suspect_sensors.push_back(enumerator<Role>(rows.integer(0)));
    }
    for (Rows rows{evidence_, number}; rows.next();) {
      out.evidence.push_back({.quantity = enumerator<Quantity>(rows.integer(0)),
                              .before_SI = rows.real(1),
                              .after_SI = rows.real(2),
                              .u_SI = rows.real(3)});
    }
  }

  Statement loss_;
  Statement cause_;
  Statement sensor_;
  Statement evidence_;
};

std::vector<Finding> all(Database& database, Rows& rows) {
  FindingReader reader{database};
  std::vector<Finding> out;
  while (rows.next()) {
    out.push_back(reader.read(rows));
  }
  return out;
}

}  // namespace

bool is_storable(const Finding& f) {
  const bool figures = is_finite(f.size) && is_finite(f.extra_energy_J) &&
                       std::isfinite(f.compared_share) && is_finite(f.extra_cost) &&
                       is_finite(f.extra_co2_kg) && is_finite(f.component_share);
  return figures &&
         std::all_of(f.lost_change_W.begin(), f.lost_change_W.end(),
                     [](const auto& change) { return is_finite(change); }) &&
         std::all_of(f.causes.begin(), f.causes.end(),
                     [](const RankedCause& cause) {
                       return std::isfinite(cause.probability) && is_finite(cause.amount_SI);
                     }) &&
         std::all_of(f.evidence.begin(), f.evidence.end(), [](const Evidence& e) {
           return std::isfinite(e.before_SI) && std::isfinite(e.after_SI) && std::isfinite(e.u_SI);
         });
}

void write_findings(Database& database, const std::vector<Finding>& findings) {
  if (findings.empty()) {
    return;
  }
  FindingWriter writer{database};
  for (const Finding& finding : findings) {
    writer.write(finding);
  }
}

std::vector<Finding> read_current_findings(Database& database,
                                           std::optional<std::string_view> machine) {
  Statement select{database,
                   "SELECT * FROM finding WHERE number IN (SELECT max(number) FROM finding "
                   "GROUP BY id) AND state <> ?1 AND (?2 OR machine = ?3) "
                   "ORDER BY onset_ms DESC, number DESC"};
  Rows rows{select, static_cast<int>(FindingState::over), machine ? 0 : 1, machine.value_or("")};
  return all(database, rows);
}

std::vector<Finding> read_findings(Database& database, Instant from, Instant to,
                                   std::optional<std::string_view> machine) {
  Statement select{database,
                   "SELECT * FROM finding WHERE number IN (SELECT max(number) FROM finding "
                   "WHERE updated_ms >= ?1 AND updated_ms < ?2 GROUP BY id) "
                   "AND (?3 OR machine = ?4) ORDER BY onset_ms DESC, number DESC"};
  Rows rows{select, ms(from), ms(to), machine ? 0 : 1, machine.value_or("")};
  return all(database, rows);
}

std::vector<Finding> read_finding_versions(Database& database, std::string_view id) {
  Statement select{database, "SELECT * FROM finding WHERE id = ?1 ORDER BY number"};
  Rows rows{select, id};
  return all(database, rows);
}

}  // namespace lostwork
