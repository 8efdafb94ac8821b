// The made-up plant behind a real server, in a thread of the test's process.
#pragma once

#include "daemon/plant_view.h"
#include "daemon/web/server.h"

#include <cstdint>
#include <functional>
#include <memory>
#include <string>
#include <vector>

namespace lostwork {

class ServedPlant {
 public:
  explicit ServedPlant(const WebLimits& limits = {}, HistorySource history = {});
  ~ServedPlant();
  ServedPlant(const ServedPlant&) = delete;
  ServedPlant& operator=(const ServedPlant&) = delete;

  [[nodiscard]] std::uint16_t port() const;
  // Changes the view on the server's thread, raises its revision and tells the server.
  void change(const std::function<void(PlantView&)>& how);
  [[nodiscard]] std::vector<std::string> acknowledged();  // "id: comment"
  [[nodiscard]] std::vector<std::string> log();

 private:
  class Implementation;
  std::unique_ptr<Implementation> implementation_;
};

}  // namespace lostwork
