#include "sensors/poller.h"

#include "sensors/backoff.h"

#include <algorithm>
#include <span>
#include <utility>
#include <variant>

namespace lostwork {
namespace {

// MODBUS Application Protocol V1.1b3, 7.
constexpr std::uint8_t illegal_address = 2;
constexpr std::uint8_t illegal_value = 3;  // some devices say so of a block that is too long
constexpr std::uint8_t device_busy = 6;
constexpr std::uint8_t gateway_path = 10;
constexpr std::uint8_t gateway_target = 11;

// Often enough to find a register that was away while its device started, and too rare to load the
// bus. Engineering judgement, no source.
constexpr Span illegal_pause = std::chrono::minutes{10};

bool is_refused_block(const BlockAnswer& answer) {
  return answer.failure == BusFailure::exception &&
         (answer.exception_code == illegal_address || answer.exception_code == illegal_value);
}

// Whether the device behind this answer is worth no further request for now.
bool is_silent(const BlockAnswer& answer) {
  return answer.failure == BusFailure::timeout || answer.failure == BusFailure::malformed ||
         (answer.failure == BusFailure::exception &&
          (answer.exception_code == device_busy || answer.exception_code == gateway_path ||
           answer.exception_code == gateway_target));
}

Quality quality_of(const BlockAnswer& answer) {
  return answer.failure == BusFailure::exception ? Quality::exception : Quality::timeout;
}

// A pause that a step of the clock cannot make longer.
bool lasts(const std::optional<Instant>& until, Instant now, Span longest) {
  return until && *until > now && *until - now <= longest;
}

Instant next_multiple(Instant now, Span period) {
  const Instant begun{std::chrono::floor<std::chrono::milliseconds>(now.time_since_epoch()) /
                      period * period};
  return begun + period;
}

void count(DeviceStatus& status, const BlockAnswer& answer) {
  ++status.requests;
  if (!answer.failure) {
    ++status.answers;
    return;
  }
  switch (*answer.failure) {
    case BusFailure::exception:
      ++status.exceptions;
      status.last_exception = answer.exception_code;
      break;
    case BusFailure::timeout: ++status.timeouts; break;
    case BusFailure::connection: ++status.no_connection; break;
    case BusFailure::malformed: ++status.malformed; break;
  }
}

BlockRules rules_of(const DeviceOptions& options) {
  return {.max_registers = options.max_registers,
          .max_bits = options.max_bits,
          .max_gap = options.max_gap};
}

}  // namespace

struct Poller::Sweep {
  Bus& bus;
  Group& group;
  Device& device;
  double altitude_m;
  Instant now;
  std::vector<PointReading>& out;

  void run() {
    readmit();
    for (const Entry& entry : group.entries) {
      if (entry.illegal_until) {
        put(entry, missing(Quality::exception, now));
      }
    }
    std::vector<Block> open(group.blocks.rbegin(), group.blocks.rend());
    group.blocks.clear();
    while (!open.empty()) {
      Block block = std::move(open.back());
      open.pop_back();
      read(std::move(block), open);
    }
  }

  // Registers whose time as a known bad one is over get a block of their own.
  void readmit() {
    for (std::size_t i = 0; i < group.entries.size(); ++i) {
      std::optional<Instant>& until = group.entries[i].illegal_until;
      if (until && !lasts(until, now, illegal_pause)) {
        until.reset();
        group.blocks.push_back(block_around(group.needs, {i}));
      }
    }
  }

  // Halves of a refused block go to `open`.
  void read(Block block, std::vector<Block>& open) {
    if (lasts(device.silent_until, now, device.options.silent_limit)) {
      fail(block, device.silent_as, now);
      group.blocks.push_back(std::move(block));
      return;
    }
    const BlockAnswer answer = bus.read({.unit = device.options.unit,
                                         .table = block.table,
                                         .address = block.address,
                                         .count = block.count});
    note(answer);
    if (is_refused_block(answer)) {
      narrow(block, answer.time, open);
      return;
    }
    if (answer.failure) {
      fail(block, quality_of(answer), answer.time);
    } else {
      decode_all(block, answer);
    }
    group.blocks.push_back(std::move(block));
  }

  void note(const BlockAnswer& answer) {
    count(device.status, answer);
    if (is_silent(answer)) {
      device.silent_as = quality_of(answer);
      device.silent_until = now + backoff(device.options.silent_first, device.options.silent_limit,
                                          ++device.failures);
    } else if (answer.failure != BusFailure::connection) {
      device.failures = 0;
      device.silent_until.reset();
      device.status.silent_since.reset();
      return;
    }
    if (!device.status.silent_since) {
      device.status.silent_since = now;
    }
  }

  void narrow(const Block& block, Instant time, std::vector<Block>& open) {
    if (block.needs.size() == 1) {
      Entry& entry = group.entries[block.needs.front()];
      entry.illegal_until = now + illegal_pause;
      put(entry, missing(Quality::exception, time));
      return;
    }
    const auto half = block.needs.begin() + static_cast<std::ptrdiff_t>(block.needs.size() / 2);
    open.push_back(block_around(group.needs, {half, block.needs.end()}));
    open.push_back(block_around(group.needs, {block.needs.begin(), half}));
  }

  void fail(const Block& block, Quality quality, Instant time) {
    for (const std::size_t i : block.needs) {
      put(group.entries[i], missing(quality, time));
    }
  }

  void decode_all(const Block& block, const BlockAnswer& answer) {
    const std::span<const std::uint16_t> words{answer.words};
    for (const std::size_t i : block.needs) {
      const RegisterNeed& need = group.needs[i];
      const std::size_t at = std::size_t{need.address} - block.address;
      const bool there = at + need.count <= words.size();
      Reading reading = reading_at(group.entries[i].spec,
                                   there ? words.subspan(at, need.count) : words.first(0), answer);
      if (answer.suspect && reading.quality == Quality::good) {
        reading.quality = Quality::suspect;
      }
      put(group.entries[i], reading);
    }
  }

  [[nodiscard]] Reading reading_at(const PointSpec& spec, std::span<const std::uint16_t> words,
                                   const BlockAnswer& answer) const {
    const tl::expected<double, Quality> value =
        decode(std::get<FromRegister>(spec.source).at, words);
    return value ? reading_of(spec, *value, altitude_m, answer.time)
                 : missing(value.error(), answer.time);
  }

  void put(const Entry& entry, const Reading& reading) {
    out.push_back({.point = entry.point, .reading = reading});
  }
};

Poller::Poller(const Wiring& wiring, std::string_view bus_id, Bus& bus)
    : bus_{bus}, altitude_m_{wiring.altitude_m} {
  for (const DeviceOptions& options : wiring.devices) {
    if (options.bus == bus_id) {
      devices_.push_back({.options = options, .status = {.device = options.id}});
    }
  }
  for (std::size_t i = 0; i < wiring.points.size(); ++i) {
    const PointSpec& spec = wiring.points[i];
    const auto* source = std::get_if<FromRegister>(&spec.source);
    const auto machine =
        std::find_if(wiring.machines.begin(), wiring.machines.end(),
                     [&spec](const MachineScan& scan) { return scan.machine == spec.machine; });
    const auto device = std::find_if(devices_.begin(), devices_.end(), [source](const Device& d) {
      return source != nullptr && d.options.id == source->device;
    });
    if (device == devices_.end() || machine == wiring.machines.end()) {
      continue;
    }
    Group& group =
        groups_[group_for(static_cast<std::size_t>(device - devices_.begin()), machine->period)];
    group.entries.push_back({.point = i, .spec = spec, .illegal_until = std::nullopt});
    group.needs.push_back({.table = source->at.table,
                           .address = source->at.address,
                           .count = word_count(source->at.type)});
  }
  for (Group& group : groups_) {
    group.blocks = blocks_of(group.needs, rules_of(devices_[group.device].options));
  }
}

std::size_t Poller::group_for(std::size_t device, Span period) {
  const auto found = std::find_if(groups_.begin(), groups_.end(), [device, period](const Group& g) {
    return g.device == device && g.period == period;
  });
  if (found != groups_.end()) {
    return static_cast<std::size_t>(found - groups_.begin());
  }
  groups_.push_back({.device = device, .period = period, .entries = {}, .needs = {}, .blocks = {}});
  return groups_.size() - 1;
}

std::vector<PointReading> Poller::poll(Instant now) {
  std::vector<PointReading> readings;
  for (Group& group : groups_) {
    const bool clock_went_back = group.due > now + group.period;
    if (group.due > now && !clock_went_back) {
      continue;
    }
    Sweep{.bus = bus_,
          .group = group,
          .device = devices_[group.device],
          .altitude_m = altitude_m_,
          .now = now,
          .out = readings}
        .run();
    group.due = next_multiple(now, group.period);
  }
  return readings;
}

Instant Poller::next_due() const {
  Instant due = Instant::max();
  for (const Group& group : groups_) {
    due = std::min(due, group.due);
  }
  return due;
}

std::vector<DeviceStatus> Poller::status() const {
  std::vector<DeviceStatus> all;
  all.reserve(devices_.size());
  for (const Device& device : devices_) {
    all.push_back(device.status);
  }
  return all;
}

}  // namespace lostwork
