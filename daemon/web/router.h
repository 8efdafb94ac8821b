// What is to be done about a request. Pure but for the answers kept of one revision.
//
// GET and HEAD change nothing. The only change is POST .../acknowledge, and the router only says
// that it was asked for.
#pragma once

#include "daemon/local_time.h"
#include "daemon/plant_view.h"
#include "daemon/web/answer.h"
#include "storage/history.h"

#include <cstdint>
#include <functional>
#include <map>
#include <memory>
#include <span>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace lostwork {

// The parts of a request that matter, as they came; a field that was not there is empty.
struct Request {
  std::string_view method;
  std::string_view target;
  std::string_view host;
  std::string_view origin;
  std::string_view fetch_site;  // Sec-Fetch-Site: what a browser says of the page that asks
  std::string_view content_type;
  std::string_view body;
};

struct AskTrend {
  std::string machine;
  TrendRequest request;  // its machine is empty: it is set where it is used
};
struct OpenEvents {};
struct AskAcknowledge {
  std::string alarm;
  std::string comment;
};
using Action = std::variant<Answer, AskTrend, OpenEvents, AskAcknowledge>;

// "127.0.0.1:8470", "localhost:8470", "[::1]:8470", and the address itself that is listened on.
[[nodiscard]] std::vector<std::string> allowed_hosts(std::string_view address, std::uint16_t port);

class Router {
 public:
  Router(const PlantView& view, UtcOffset offset, std::vector<std::string> hosts)
      : view_{view}, offset_{std::move(offset)}, hosts_{std::move(hosts)} {}

  // HEAD gets what GET does; the body is left out by whoever writes it.
  [[nodiscard]] Action route(const Request& request);
  // The event of the present revision.
  [[nodiscard]] std::shared_ptr<const std::string> event();

  // For tests: every path pattern with its method, as in openapi.json.
  struct Route {
    std::string_view method;
    std::string_view path;  // "/api/v1/machines/{id}/trend"
  };
  [[nodiscard]] static std::span<const Route> routes();

 private:
  using Body = std::shared_ptr<const std::string>;
  [[nodiscard]] bool is_ours(std::string_view host) const;
  [[nodiscard]] Action get(const Request& request);
  [[nodiscard]] Action post(const Request& request) const;
  [[nodiscard]] Action of_machine(const std::vector<std::string>& segments,
                                  const std::vector<std::pair<std::string, std::string>>& query);
  [[nodiscard]] Body kept(std::string_view name, const std::function<std::string()>& make);

  const PlantView& view_;
  UtcOffset offset_;
  std::vector<std::string> hosts_;
  std::map<std::string, Body, std::less<>> kept_;  // of kept_revision_ and kept_time_
  std::uint64_t kept_revision_ = 0;
  Instant kept_time_{};
};

}  // namespace lostwork
