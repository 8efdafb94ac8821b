#include "storage/finding_table.h"
#include "storage/history.h"
#include "storage/key.h"
#include "storage/store.h"
#include "tests/storage/plant.h"

#include <limits>
#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

Finding finding(const std::string& id, Instant updated) {
  Finding out;
  out.id = id;
  out.machine = "chiller-1";
  out.kind = FindingKind::efficiency_drift;
  out.state = FindingState::active;
  out.size = {.value = 0.06, .u = 0.01};
  out.onset = {.best = midnight, .earliest = midnight - day, .latest = midnight + day};
  out.first_seen = midnight + 2 * day;
  out.updated = updated;
  out.extra_energy_J = {.value = 1.0 / 3.0, .u = 0.1};
  out.compared_share = 0.9;
  out.currency = "EUR";
  out.component_share = {.value = 0.7, .u = 0.2};
  out.baseline_id = "b1";
  return out;
}

Finding full_finding() {
  Finding out = finding("chiller-1.efficiency_drift.20231115", midnight + 9 * day);
  out.confirmed = midnight + 3 * day;
  out.ended = midnight + 9 * day;
  out.extra_cost = Measured{.value = 120.5, .u = 8.0};
  out.extra_co2_kg = Measured{.value = 77.0, .u = 3.0};
  out.lost_change_W[1] = Measured{.value = 800.0, .u = 90.0};
  out.lost_change_W[3] = Measured{.value = -20.0, .u = 60.0};
  out.component = Component::condenser;
  out.causes = {
      {.cause = Cause::condenser_fouled,
       .role = {},
       .probability = 0.8,
       .amount_SI = {.value = 1.9, .u = 0.3}  },
      {          .cause = Cause::sensor,
       .role = Role::hot_flow,
       .probability = 0.2,
       .amount_SI = {.value = -0.1, .u = 0.02}}
  };
  out.cause_is_clear = true;
  out.suspect_sensors = {Role::hot_flow, Role::power};
  out.evidence = {
      {.quantity = Quantity::hot_approach, .before_SI = 1.5, .after_SI = 3.4, .u_SI = 0.2}
  };
  return out;
}

class Findings : public testing::Test {
 protected:
  WriteResult write(std::vector<Finding> findings) {
    Batch batch;
    batch.findings = std::move(findings);
    return store_.write(std::move(batch));
  }
  [[nodiscard]] History history() const { return History{folder_.file()}; }

  Folder folder_;
  Store store_{
      {.file = folder_.file(), .durability = Durability::process}
  };
};

TEST_F(Findings, ComeBackWithEveryFigure) {
  const Finding f = full_finding();
  ASSERT_TRUE(write({f}).stored);
  const auto read = history().finding_versions(f.id);
  ASSERT_EQ(read.size(), 1U);
  const Finding& r = read[0];
  EXPECT_EQ(r.machine, f.machine);
  EXPECT_EQ(r.kind, f.kind);
  EXPECT_EQ(r.state, f.state);
  EXPECT_EQ(r.size, f.size);
  EXPECT_EQ(r.onset.best, f.onset.best);
  EXPECT_EQ(r.onset.earliest, f.onset.earliest);
  EXPECT_EQ(r.onset.latest, f.onset.latest);
  EXPECT_EQ(r.first_seen, f.first_seen);
  EXPECT_EQ(r.confirmed, f.confirmed);
  EXPECT_EQ(r.ended, f.ended);
  EXPECT_EQ(r.updated, f.updated);
  EXPECT_EQ(r.extra_energy_J, f.extra_energy_J);
  EXPECT_EQ(r.compared_share, f.compared_share);
  EXPECT_EQ(r.extra_cost, f.extra_cost);
  EXPECT_EQ(r.currency, f.currency);
  EXPECT_EQ(r.extra_co2_kg, f.extra_co2_kg);
  EXPECT_EQ(r.lost_change_W, f.lost_change_W);
  EXPECT_EQ(r.component, f.component);
  EXPECT_EQ(r.component_share, f.component_share);
  EXPECT_EQ(r.cause_is_clear, f.cause_is_clear);
  EXPECT_EQ(r.suspect_sensors, f.suspect_sensors);
  EXPECT_EQ(r.baseline_id, f.baseline_id);
}

TEST_F(Findings, ComeBackWithTheirCausesInOrder) {
  ASSERT_TRUE(write({full_finding()}).stored);
  const auto causes = history().current_findings().at(0).causes;
  ASSERT_EQ(causes.size(), 2U);
  EXPECT_EQ(causes[0].cause, Cause::condenser_fouled);
  EXPECT_EQ(causes[0].role, std::nullopt);
  EXPECT_EQ(causes[0].probability, 0.8);
  EXPECT_EQ(causes[0].amount_SI, (Measured{.value = 1.9, .u = 0.3}));
  EXPECT_EQ(causes[1].cause, Cause::sensor);
  EXPECT_EQ(causes[1].role, Role::hot_flow);
}

TEST_F(Findings, ComeBackWithTheirEvidence) {
  ASSERT_TRUE(write({full_finding()}).stored);
  const auto evidence = history().current_findings().at(0).evidence;
  ASSERT_EQ(evidence.size(), 1U);
  EXPECT_EQ(evidence[0].quantity, Quantity::hot_approach);
  EXPECT_EQ(evidence[0].before_SI, 1.5);
  EXPECT_EQ(evidence[0].after_SI, 3.4);
  EXPECT_EQ(evidence[0].u_SI, 0.2);
}

TEST_F(Findings, ComeBackWithoutFiguresThatTheyDoNotHave) {
  const Finding f = finding("a", midnight);
  ASSERT_TRUE(write({f}).stored);
  const Finding r = history().current_findings().at(0);
  EXPECT_EQ(r.confirmed, std::nullopt);
  EXPECT_EQ(r.ended, std::nullopt);
  EXPECT_EQ(r.extra_cost, std::nullopt);
  EXPECT_EQ(r.extra_co2_kg, std::nullopt);
  EXPECT_EQ(r.component, std::nullopt);
  EXPECT_EQ(r.lost_change_W, f.lost_change_W);
  EXPECT_TRUE(r.causes.empty());
}

TEST_F(Findings, AreCurrentInTheirNewestVersionUntilTheyAreOver) {
  Finding later = finding("a", midnight + day);
  later.size.value = 0.08;
  ASSERT_TRUE(write({finding("a", midnight), later, finding("b", midnight)}).stored);
  Finding over = finding("b", midnight + day);
  over.state = FindingState::over;
  ASSERT_TRUE(write({over}).stored);
  const auto current = history().current_findings("chiller-1");
  ASSERT_EQ(current.size(), 1U);
  EXPECT_EQ(current[0].id, "a");
  EXPECT_EQ(current[0].size.value, 0.08);
}

TEST_F(Findings, OfAnotherMachineAreLeftOut) {
  ASSERT_TRUE(write({finding("a", midnight)}).stored);
  EXPECT_TRUE(history().current_findings("heat-pump-1").empty());
  EXPECT_TRUE(history().findings(first_storable, last_storable, "heat-pump-1").empty());
}

TEST_F(Findings, OfASpanAreTheNewestVersionsUpdatedInIt) {
  ASSERT_TRUE(write({finding("a", midnight), finding("a", midnight + day),
                     finding("b", midnight + 5 * day)})
                  .stored);
  const auto found = history().findings(midnight, midnight + 2 * day);
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(found[0].updated, midnight + day);
}

TEST_F(Findings, KeepEveryVersionOnce) {
  ASSERT_TRUE(write({finding("a", midnight), finding("a", midnight + day)}).stored);
  ASSERT_TRUE(write({finding("a", midnight), finding("a", midnight + day)}).stored);
  const auto versions = history().finding_versions("a");
  ASSERT_EQ(versions.size(), 2U);
  EXPECT_LT(versions[0].updated, versions[1].updated);
}

TEST_F(Findings, WithAFigureThatIsNotFiniteAreGivenUpAndTheRestIsStored) {
  Finding bad = finding("bad", midnight);
  bad.extra_energy_J.value = std::numeric_limits<double>::quiet_NaN();
  const WriteResult result = write({bad, finding("a", midnight)});
  EXPECT_TRUE(result.stored);
  EXPECT_EQ(result.given_up, 1U);
  EXPECT_EQ(history().current_findings().size(), 1U);
}

}  // namespace
}  // namespace lostwork
