#include "daemon/web/router.h"

#include "daemon/web/acknowledge_question.h"
#include "daemon/web/api_json.h"
#include "daemon/web/embedded.h"
#include "daemon/web/metrics.h"
#include "daemon/web/target.h"
#include "daemon/web/trend_question.h"

#include <algorithm>
#include <array>
#include <cctype>
#include <utility>

namespace lostwork {
namespace {

constexpr std::array<Router::Route, 12> table{
    {
     {"GET", "/api/v1/machines"},
     {"GET", "/api/v1/machines/{id}/assessment"},
     {"GET", "/api/v1/machines/{id}/trend"},
     {"GET", "/api/v1/quantities"},
     {"GET", "/api/v1/alarms"},
     {"POST", "/api/v1/alarms/{id}/acknowledge"},
     {"GET", "/api/v1/findings"},
     {"GET", "/api/v1/events"},
     {"GET", "/api/v1/openapi.json"},
     {"GET", "/metrics"},
     {"GET", "/healthz"},
     {"GET", "/"},
     }
};
constexpr std::size_t longest_id = 200;

bool matches(std::string_view pattern, const std::vector<std::string>& segments) {
  pattern.remove_prefix(1);
  for (const std::string& segment : segments) {
    const std::size_t end = pattern.find('/');
    const std::string_view piece = pattern.substr(0, end);
    if (piece.empty() || (piece != "{id}" && piece != segment)) {
      return false;
    }
    pattern.remove_prefix(end == std::string_view::npos ? pattern.size() : end + 1);
  }
  return pattern.empty();
}

const Router::Route* route_of(const std::vector<std::string>& segments) {
  const auto* const route = std::find_if(
      table.begin(), table.end(), [&segments](const auto& r) { return matches(r.path, segments); });
  return route == table.end() ? nullptr : route;
}

const EmbeddedFile* file_of(std::string_view target) {
  const std::string_view path = target.substr(0, target.find('?'));
  const auto files = embedded_files();
  const auto file = std::find_if(files.begin(), files.end(),
                                 [path](const EmbeddedFile& f) { return f.path == path; });
  return file == files.end() ? nullptr : &*file;
}

Answer file_answer(const EmbeddedFile& file) {
  Answer answer;
  answer.content_type = file.content_type;
  answer.body = file.content;
  answer.cache_control = "no-cache";
  return answer;
}

Answer not_found() {
  return problem(404, "There is nothing here by that name.");
}

Answer wrong_method(std::string_view allow) {
  Answer answer = problem(405, "This place does not take that method.");
  answer.allow = allow;
  return answer;
}

std::string lower(std::string_view text) {
  std::string result{text};
  std::transform(result.begin(), result.end(), result.begin(),
                 [](unsigned char c) { return static_cast<char>(std::tolower(c)); });
  return result;
}

bool is_json(std::string_view content_type) {
  std::string type = lower(content_type);
  type.erase(std::remove(type.begin(), type.end(), ' '), type.end());
  return type == "application/json" || type == "application/json;charset=utf-8";
}

// A browser says so when a page of another site asks.
bool is_foreign(std::string_view fetch_site) {
  return !fetch_site.empty() && fetch_site != "same-origin" && fetch_site != "none";
}

constexpr std::string_view json_type = "application/json";

}  // namespace

std::vector<std::string> allowed_hosts(std::string_view address, std::uint16_t port) {
  std::vector<std::string> hosts;
  const bool is_v6 = address.find(':') != std::string_view::npos;
  const std::string own = is_v6 ? '[' + std::string{address} + ']' : std::string{address};
  for (const std::string& name :
       {std::string{"127.0.0.1"}, std::string{"localhost"}, std::string{"[::1]"}, own}) {
    hosts.push_back(name + ':' + std::to_string(port));
    if (port == 80) {  // the only port that a browser leaves out
      hosts.push_back(name);
    }
  }
  return hosts;
}

std::span<const Router::Route> Router::routes() {
  return table;
}

bool Router::is_ours(std::string_view host) const {
  return std::find(hosts_.begin(), hosts_.end(), lower(host)) != hosts_.end();
}

Action Router::route(const Request& request) {
  if (!is_ours(request.host)) {
    return problem(421, "This server answers only to its own loopback address and port.");
  }
  const bool reading = request.method == "GET" || request.method == "HEAD";
  if (reading) {
    return get(request);
  }
  return post(request);
}

Action Router::get(const Request& request) {
  if (const EmbeddedFile* file = file_of(request.target)) {
    return file_answer(*file);
  }
  const auto target = target_of(request.target);
  if (!target) {
    return problem(400, "The address asked for is malformed.");
  }
  const Route* route = route_of(target->segments);
  if (route == nullptr) {
    return not_found();
  }
  if (route->method != "GET") {
    return wrong_method(route->method);
  }
  if (is_foreign(request.fetch_site)) {
    return problem(403, "Pages of other sites are not answered.");
  }
  if (target->segments.size() == 5) {
    return of_machine(target->segments, target->query);
  }
  if (!target->query.empty()) {
    return problem(400, "The parameter " + shown_value(target->query.front().first) +
                            " is not known; there is none here.");
  }
  if (route->path == "/api/v1/events") {
    return OpenEvents{};
  }
  if (route->path == "/metrics") {
    return shared_answer(openmetrics_type, kept("metrics", [this] { return metrics_text(view_); }));
  }
  if (route->path == "/healthz") {
    return shared_answer(json_type, kept("health", [this] { return health_json(view_); }));
  }
  const std::string& list = target->segments.back();
  return shared_answer(json_type, kept(list, [this, &list] {
                         if (list == "machines") {
                           return machines_json(view_, offset_);
                         }
                         if (list == "alarms") {
                           return alarms_json(view_);
                         }
                         return list == "findings" ? findings_json(view_, offset_)
                                                   : quantities_json();
                       }));
}

Action Router::of_machine(const std::vector<std::string>& segments,
                          const std::vector<std::pair<std::string, std::string>>& query) {
  const std::string& id = segments.at(3);
  const auto machine = std::find_if(view_.machines.begin(), view_.machines.end(),
                                    [&id](const MachineView& m) { return m.id == id; });
  if (machine == view_.machines.end()) {
    return problem(404, "There is no machine " + shown_value(id) + '.');
  }
  if (segments.back() == "trend") {
    const auto request = trend_request(query);
    if (!request) {
      return request.error();
    }
    return AskTrend{.machine = id, .request = *request};
  }
  if (!query.empty()) {
    return problem(400, "The parameter " + shown_value(query.front().first) +
                            " is not known; there is none here.");
  }
  return shared_answer(json_type, kept("assessment/" + id, [this, &machine] {
                         return assessment_json(*machine, view_.time);
                       }));
}

Action Router::post(const Request& request) const {
  const auto target = target_of(request.target);
  if (!target) {
    return problem(400, "The address asked for is malformed.");
  }
  const Route* route = route_of(target->segments);
  if (route == nullptr) {
    return file_of(request.target) != nullptr ? wrong_method("GET, HEAD") : not_found();
  }
  if (route->method != request.method) {
    return wrong_method(route->method == "GET" ? "GET, HEAD" : route->method);
  }
  const bool own_origin = request.origin.empty() || (request.origin.starts_with("http://") &&
                                                     is_ours(request.origin.substr(7)));
  if (!own_origin || is_foreign(request.fetch_site)) {
    return problem(403, "Only this server's own page may change anything.");
  }
  if (!is_json(request.content_type)) {
    return problem(415, "The body must be application/json.");
  }
  if (!target->query.empty()) {
    return problem(400, "There are no parameters here.");
  }
  const std::string& alarm = target->segments.at(3);
  if (alarm.size() > longest_id) {
    return problem(404, "There is no alarm " + shown_value(alarm) + '.');
  }
  const auto comment = comment_of(request.body);
  if (!comment) {
    return comment.error();
  }
  return AskAcknowledge{.alarm = alarm, .comment = *comment};
}

Router::Body Router::kept(std::string_view name, const std::function<std::string()>& make) {
  if (kept_revision_ != view_.revision || kept_time_ != view_.time) {
    kept_.clear();
    kept_revision_ = view_.revision;
    kept_time_ = view_.time;
  }
  const auto known = kept_.find(name);
  if (known != kept_.end()) {
    return known->second;
  }
  return kept_.emplace(name, std::make_shared<const std::string>(make())).first->second;
}

std::shared_ptr<const std::string> Router::event() {
  return kept("event", [this] {
    return "id: " + std::to_string(view_.revision) +
           "\nevent: change\ndata: " + event_json(view_, offset_) + "\n\n";
  });
}

}  // namespace lostwork
