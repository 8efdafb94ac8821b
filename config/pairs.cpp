#include "config/pairs.h"

#include "config/near_name.h"
#include "config/point_entry.h"

#include <algorithm>
#include <iterator>
#include <string>
#include <string_view>

namespace lostwork {
namespace {

constexpr std::string_view pair_form =
    "a name that exactly two points of one machine and one unit share";

// All points that name one pair.
struct Group {
  std::string_view name;
  std::vector<std::size_t> members;  // indices into the file's points
  const PairEntry* declared;         // nullptr: no [[pair]] has the name
};

const PairEntry* declared(const PlantFile& file, std::string_view name) {
  const auto found = std::find_if(file.pairs.begin(), file.pairs.end(),
                                  [name](const PairEntry& pair) { return pair.id == name; });
  return found == file.pairs.end() ? nullptr : &*found;
}

// In the order in which the points first name them.
std::vector<Group> groups_of(const PlantFile& file) {
  std::vector<Group> groups;
  for (std::size_t i = 0; i < file.points.size(); ++i) {
    const PointEntry& point = file.points[i];
    if (!point.pair || !point.place.sound("pair")) {
      continue;
    }
    auto group = std::find_if(groups.begin(), groups.end(),
                              [&point](const Group& g) { return g.name == *point.pair; });
    if (group == groups.end()) {
      groups.push_back(
          {.name = *point.pair, .members = {}, .declared = declared(file, *point.pair)});
      group = std::prev(groups.end());
    }
    group->members.push_back(i);
  }
  return groups;
}

class PairReader {
 public:
  PairReader(const PlantFile& file, const std::vector<std::optional<PointSpec>>& specs,
             Problems& problems)
      : file_{file}, specs_{specs}, problems_{problems}, groups_{groups_of(file)} {}

  std::vector<PairShare> read() {
    std::vector<PairShare> out(file_.points.size());
    for (std::size_t i = 0; i < groups_.size(); ++i) {
      check_members(i);
      const double variance = shared_variance(groups_[i]);
      for (const std::size_t member : groups_[i].members) {
        out[member] = {.pair = i, .variance = variance};
      }
    }
    return out;
  }

 private:
  [[nodiscard]] const PointEntry& first_of(const Group& group) const {
    return file_.points[group.members.front()];
  }

  void refuse_pair(std::size_t member, std::string allowed) {
    refuse(problems_, file_.points[member].place, "pair", std::move(allowed));
  }

  // Where one of two points has a problem in what is compared, nothing is said of the two.
  [[nodiscard]] bool fit(const PointEntry& a, const PointEntry& b) const {
    const auto machine_known = [this](const PointEntry& point) {
      return std::any_of(file_.machines.begin(), file_.machines.end(),
                         [&point](const MachineEntry& m) { return m.id == point.machine; });
    };
    const bool units_differ = unit_of(a) && unit_of(b) && a.unit != b.unit;
    const bool machines_differ = machine_known(a) && machine_known(b) && a.machine != b.machine;
    return !units_differ && !machines_differ;
  }

  void check_members(std::size_t index) {
    const Group& group = groups_[index];
    if (group.members.size() == 1) {
      if (!is_excused(index)) {
        refuse_pair(group.members[0], std::string{pair_form});
      }
      return;
    }
    const PointEntry& a = first_of(group);
    const PointEntry& b = file_.points[group.members[1]];
    if (!fit(a, b)) {
      refuse_pair(group.members[1], std::string{pair_form} + "; the other one is " + a.place.name);
    }
    for (std::size_t i = 2; i < group.members.size(); ++i) {
      refuse_pair(group.members[i], std::string{pair_form} + "; " + a.place.name + " and " +
                                        b.place.name + " share this one");
    }
  }

  // Whether a point that is alone with its pair's name is so because of another one's mistake.
  [[nodiscard]] bool is_excused(std::size_t index) const {
    const PointEntry& own = first_of(groups_[index]);
    for (const PointEntry& other : file_.points) {
      if (!other.place.sound("pair") && fit(own, other)) {
        return true;
      }
    }
    for (std::size_t i = 0; i < groups_.size(); ++i) {
      if (i != index && groups_[i].members.size() == 1 && takes_the_blame(i, index)) {
        return true;
      }
    }
    return false;
  }

  // Of two lonely names that were meant to be one, the one that no [[pair]] declares is wrong; else
  // the later one, if it is but a slip of the other.
  [[nodiscard]] bool takes_the_blame(std::size_t index, std::size_t from) const {
    const Group& group = groups_[index];
    const Group& other = groups_[from];
    if (!fit(first_of(group), first_of(other))) {
      return false;
    }
    if ((group.declared == nullptr) != (other.declared == nullptr)) {
      return group.declared == nullptr;
    }
    return index > from && is_slip_of(group.name, other.name);
  }

  double shared_variance(const Group& group) {
    if (group.declared == nullptr) {
      return default_shared_variance;
    }
    const PairEntry& pair = *group.declared;
    const auto unit = unit_of(first_of(group));
    const std::size_t before = problems_.size();
    const std::vector<Accuracy> stated =
        accuracies(pair.difference, unit.value_or(Unit::degC), pair.place, "difference", problems_);
    const bool stated_well = problems_.size() == before && pair.place.refused.empty();
    if (!stated_well || group.members.size() != 2 || !specs_[group.members[0]] ||
        !specs_[group.members[1]]) {
      return default_shared_variance;
    }
    const double u_a = u_alone(group.members[0]);
    const double u_b = u_alone(group.members[1]);
    const double u_difference = standard_u_SI(stated, *unit, 0.0, 0.0);
    if (!(u_difference * u_difference <= u_a * u_a + u_b * u_b)) {
      refuse(
          problems_, pair.place, "difference",
          "at least as accurate as its two sensors on their own; give the points their accuracy");
    }
    if (!(u_a > 0.0 && u_b > 0.0)) {
      return default_shared_variance;
    }
    // var(a - b) = u_a^2 + u_b^2 - 2 share u_a u_b
    return std::min(1.0, (u_a * u_a + u_b * u_b - u_difference * u_difference) / (2.0 * u_a * u_b));
  }

  // At a typical value, for none is known yet.
  [[nodiscard]] double u_alone(std::size_t member) const {
    const PointSpec& spec = *specs_[member];
    const double typical = spec.range ? (spec.range->min + spec.range->max) / 2.0 : 20.0;
    return standard_u_SI(spec.accuracies, spec.unit, typical, quantum(spec));
  }

  const PlantFile& file_;
  const std::vector<std::optional<PointSpec>>& specs_;
  Problems& problems_;
  std::vector<Group> groups_;
};

}  // namespace

std::vector<PairShare> pair_shares(const PlantFile& file,
                                   const std::vector<std::optional<PointSpec>>& specs,
                                   Problems& problems) {
  return PairReader{file, specs, problems}.read();
}

}  // namespace lostwork
