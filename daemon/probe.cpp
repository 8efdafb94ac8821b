#include "daemon/probe.h"

#include "sensors/modbus_bus.h"
#include "sensors/poller.h"

#include <chrono>
#include <iomanip>
#include <memory>
#include <variant>
#include <vector>

namespace lostwork {
namespace {

void print_reading(const Wiring& wiring, const PointReading& read, std::ostream& out) {
  const PointSpec& point = wiring.points[read.point];
  out << "  " << point.id << " (" << name(point.role) << "): ";
  if (read.reading.quality == Quality::good) {
    out << std::setprecision(6) << from_SI(point.unit, read.reading.value_SI, wiring.altitude_m)
        << ' ' << name(point.unit) << '\n';
  } else {
    out << name(read.reading.quality) << '\n';
  }
}

bool probe_bus(const Wiring& wiring, const BusOptions& options, std::ostream& out) {
  out << "bus " << options.id << ": reading with function codes 1 to 4, nothing is written\n";
  const auto bus = modbus_bus(options);
  if (!bus) {
    out << "  " << bus.error() << '\n';
    return false;
  }
  Poller poller{wiring, options.id, **bus};
  const Instant now = poller.next_due();
  bool well = true;
  for (const PointReading& read : poller.poll(now)) {
    print_reading(wiring, read, out);
    well = well && read.reading.quality == Quality::good;
  }
  return well;
}

}  // namespace

bool probe(const Wiring& wiring, std::ostream& out) {
  Wiring together = wiring;  // one period, so that one poll reads every point
  for (MachineScan& machine : together.machines) {
    machine.period = together.machines.front().period;
  }
  bool well = true;
  for (const BusOptions& bus : together.buses) {
    well = probe_bus(together, bus, out) && well;
  }
  return well;
}

}  // namespace lostwork
