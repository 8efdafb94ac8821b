#include "daemon/advance.h"
#include "thermo/archive.h"

#include <algorithm>
#include <cstring>
#include <exception>
#include <utility>

namespace lostwork {
namespace {

// In front of the bytes: what they are, their layout, and a checksum over what follows.
struct Preamble {
  static constexpr std::uint32_t mark = 0x4c574d53;

  std::uint32_t kind = mark;
  std::uint32_t version = machine_state_version;
  std::uint64_t checksum = 0;
};
constexpr std::size_t preamble_bytes = 16;

template <class Archive>
void archive(Archive& a, Preamble& p) {
  a(p.kind, p.version, p.checksum);
}

// FNV-1a, 64 bit (Fowler, Noll, Vo): every single changed byte changes it, for each of its steps
// can be undone.
std::uint64_t checksum(const std::uint8_t* bytes, std::size_t size) {
  std::uint64_t sum = 0xcbf29ce484222325ULL;
  for (std::size_t i = 0; i < size; ++i) {
    sum = (sum ^ bytes[i]) * 0x100000001b3ULL;
  }
  return sum;
}

void forget_times(SteadyState& state) {
  state.blocks.clear();
  state.joined.clear();
  state.open = {};
  state.last_scan.reset();
  state.used_until.reset();
  state.learned_until.reset();
  state.edge.reset();
  for (SteadySignal& signal : state.signals) {
    signal.last_good.reset();
    signal.gap_ended.reset();
  }
}

OperationState without_times(const OperationState& state) {
  OperationState out;
  out.starts_seen = state.starts_seen;
  out.run_time = state.run_time;
  return out;
}

void forget_times(AlarmBook& book) {
  for (AlarmSlot& slot : book.slots) {
    slot.turning.reset();
    slot.activations = {};
  }
  for (PointWatch& watch : book.watches) {
    watch.last_good.reset();
    watch.missed_since.reset();
  }
}

// What was learned of a point belongs to its id.
template <class T>
std::vector<T> by_id(const std::vector<std::string>& old_ids, const std::vector<T>& old,
                     const std::vector<std::string>& ids) {
  std::vector<T> out(ids.size());
  for (std::size_t i = 0; i < ids.size(); ++i) {
    const auto found = std::find(old_ids.begin(), old_ids.end(), ids[i]);
    const auto at = static_cast<std::size_t>(found - old_ids.begin());
    if (at < old.size()) {
      out[i] = old[at];
    }
  }
  return out;
}

}  // namespace

template <class Archive>
void archive(Archive& a, MachineState& s) {
  a(s.operation, s.steady, s.health, s.alarms, s.points, s.last_scan, s.scans);
}

std::vector<std::uint8_t> save(const MachineState& state) {
  ArchiveWriter body;
  MachineState copy = state;  // one archive function writes and reads, so it takes no const
  body(copy);
  Preamble preamble;
  preamble.checksum = checksum(body.bytes().data(), body.bytes().size());
  ArchiveWriter front;
  front(preamble);
  std::vector<std::uint8_t> out = front.bytes();
  out.insert(out.end(), body.bytes().begin(), body.bytes().end());
  return out;
}

tl::expected<MachineState, std::string> load(const StepModel& model,
                                             const std::vector<std::uint8_t>& bytes) {
  const auto refuse = [](const char* why) { return tl::unexpected{std::string{why}}; };
  if (bytes.size() < preamble_bytes) {
    return refuse("the stored state ends early");
  }
  try {
    ArchiveReader front{bytes};
    Preamble preamble;
    front(preamble);
    if (preamble.kind != Preamble::mark) {
      return refuse("the stored bytes are not the state of a machine");
    }
    if (preamble.version != machine_state_version) {
      return refuse("the stored state is of another version of the program");
    }
    const std::vector<std::uint8_t> body(bytes.begin() + preamble_bytes, bytes.end());
    if (preamble.checksum != checksum(body.data(), body.size())) {
      return refuse("the stored state is damaged: its checksum is wrong");
    }
    ArchiveReader reader{body};
    MachineState state;
    reader(state);
    if (!reader.at_end()) {
      return refuse("the stored state is longer than it should be");
    }
    return fitted(model, std::move(state));
  } catch (const std::exception& error) {
    return refuse(error.what());
  }
}

MachineState fitted(const StepModel& model, MachineState state) {
  std::vector<std::string> ids;
  for (const ModelPoint& point : model.machine.points) {
    ids.push_back(point.id);
  }
  if (state.points != ids) {
    state.steady.signals = by_id(state.points, state.steady.signals, ids);
    state.alarms.watches = by_id(state.points, state.alarms.watches, ids);
    state.steady.blocks.clear();
    state.steady.joined.assign(ids.size(), {});
    state.steady.open = {};
    state.steady.open.signals.assign(ids.size(), {});
    state.steady.open.quantities.assign(quantity_count, {});
    for (SteadyDay& day : state.steady.days) {
      day.lost_to = by_id(state.points, day.lost_to, ids);
    }
    state.points = std::move(ids);
  }
  state.alarms = fitted(model.machine, model.alarms, std::move(state.alarms));
  return state;
}

MachineState clock_set_back(MachineState state, Instant now) {
  state.operation = without_times(state.operation);
  forget_times(state.steady);
  forget_times(state.alarms);
  state.last_scan = now - Span{1};
  return state;
}

}  // namespace lostwork
