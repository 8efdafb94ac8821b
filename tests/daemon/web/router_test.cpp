#include "daemon/web/router.h"

#include "tests/daemon/web/made_up_plant.h"

#include <algorithm>
#include <chrono>
#include <string>
#include <variant>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;
using testing::Not;

UtcOffset utc() {
  return [](Instant /*time*/) { return std::chrono::seconds{0}; };
}

class RouterTest : public testing::Test {
 protected:
  PlantView view = made_up_plant();
  Router router{view, utc(), allowed_hosts("127.0.0.1", 8470)};

  static Request get(std::string_view target) {
    return {.method = "GET",
            .target = target,
            .host = "127.0.0.1:8470",
            .origin = {},
            .fetch_site = {},
            .content_type = {},
            .body = {}};
  }
  static Request acknowledge(std::string_view id_path) {
    Request request = get(id_path);
    request.method = "POST";
    request.origin = "http://127.0.0.1:8470";
    request.content_type = "application/json";
    request.body = "{}";
    return request;
  }
  Answer answer(const Request& request) {
    const Action action = router.route(request);
    const auto* ready = std::get_if<Answer>(&action);
    return ready != nullptr
               ? *ready
               : Answer{
                     .status = 0, .owner = {}, .body = "no answer", .allow = {}, .retry_after = {}};
  }
};

constexpr std::string_view acknowledge_path = "/api/v1/alarms/chiller-1.drift/acknowledge";

TEST_F(RouterTest, RefusesAnotherHost) {
  for (const std::string_view host : {"", "tern-quay.example", "127.0.0.1", "127.0.0.1:80",
                                      "127.0.0.1:8470.example", "10.0.0.1:8470", "localhost"}) {
    Request request = get("/api/v1/machines");
    request.host = host;
    EXPECT_EQ(answer(request).status, 421) << host;
  }
}

TEST_F(RouterTest, RefusesAnotherHostForThePageToo) {
  Request request = get("/");
  request.host = "tern-quay.example";
  EXPECT_EQ(answer(request).status, 421);
}

TEST_F(RouterTest, AnswersToEveryLoopbackName) {
  for (const std::string_view host :
       {"127.0.0.1:8470", "localhost:8470", "LOCALHOST:8470", "[::1]:8470"}) {
    Request request = get("/api/v1/machines");
    request.host = host;
    EXPECT_EQ(answer(request).status, 200) << host;
  }
}

TEST_F(RouterTest, RefusesReadsByPagesOfOtherSites) {
  for (const std::string_view site : {"cross-site", "same-site", "anything"}) {
    Request request = get("/api/v1/events");
    request.fetch_site = site;
    EXPECT_EQ(answer(request).status, 403) << site;
  }
}

TEST_F(RouterTest, LetsAnotherSiteLinkToThePage) {
  Request request = get("/");
  request.fetch_site = "cross-site";
  EXPECT_EQ(answer(request).status, 200);
}

TEST_F(RouterTest, RefusesChangesByPagesOfOtherSites) {
  for (const std::string_view origin :
       {"http://tern-quay.example", "null", "https://127.0.0.1:8470", "http://127.0.0.1:8471",
        "http://127.0.0.1"}) {
    Request request = acknowledge(acknowledge_path);
    request.origin = origin;
    EXPECT_EQ(answer(request).status, 403) << origin;
  }
}

TEST_F(RouterTest, RefusesChangesThatABrowserCallsForeign) {
  Request request = acknowledge(acknowledge_path);
  request.origin = "";
  request.fetch_site = "cross-site";
  EXPECT_EQ(answer(request).status, 403);
}

TEST_F(RouterTest, TakesChangesByAProgramWithoutAnOrigin) {
  Request request = acknowledge(acknowledge_path);
  request.origin = "";
  EXPECT_TRUE(std::holds_alternative<AskAcknowledge>(router.route(request)));
}

TEST_F(RouterTest, AsksForTheAcknowledgement) {
  Request request = acknowledge(acknowledge_path);
  request.body = R"({"comment":"seen"})";
  const Action action = router.route(request);
  const auto* ask = std::get_if<AskAcknowledge>(&action);
  ASSERT_NE(ask, nullptr);
  EXPECT_EQ(ask->alarm, "chiller-1.drift");
  EXPECT_EQ(ask->comment, "seen");
}

TEST_F(RouterTest, TakesOnlyJsonForAChange) {
  for (const std::string_view type :
       {"", "text/plain", "application/x-www-form-urlencoded", "application/json;charset=latin1"}) {
    Request request = acknowledge(acknowledge_path);
    request.content_type = type;
    EXPECT_EQ(answer(request).status, 415) << type;
  }
}

TEST_F(RouterTest, TakesJsonWithItsCharset) {
  Request request = acknowledge(acknowledge_path);
  request.content_type = "Application/JSON; charset=UTF-8";
  EXPECT_TRUE(std::holds_alternative<AskAcknowledge>(router.route(request)));
}

TEST_F(RouterTest, RefusesParametersOfAChange) {
  EXPECT_EQ(answer(acknowledge("/api/v1/alarms/a/acknowledge?x=1")).status, 400);
}

TEST_F(RouterTest, NamesTheMethodsThatAPlaceTakes) {
  Request request = get(acknowledge_path);
  EXPECT_EQ(answer(request).status, 405);
  EXPECT_EQ(answer(request).allow, "POST");
  request.target = "/api/v1/machines";
  for (const std::string_view method : {"POST", "PUT", "DELETE", "OPTIONS", "TRACE", "get"}) {
    request.method = method;
    EXPECT_EQ(answer(request).status, 405) << method;
    EXPECT_EQ(answer(request).allow, "GET, HEAD") << method;
  }
}

TEST_F(RouterTest, HasNothingAtUnknownPlaces) {
  for (const std::string_view target :
       {"/api", "/api/v1", "/api/v1/machine", "/api/v2/machines", "/api/v1/machines/chiller-1",
        "/index.html", "/../etc/passwd", "/api/v1/machines/chiller-1/assessment/x"}) {
    EXPECT_EQ(answer(get(target)).status, 404) << target;
  }
}

TEST_F(RouterTest, HasNothingOfAMachineThatIsNotThere) {
  EXPECT_EQ(answer(get("/api/v1/machines/chiller-9/assessment")).status, 404);
  EXPECT_EQ(answer(get("/api/v1/machines/chiller-9/trend")).status, 404);
}

TEST_F(RouterTest, RefusesAMalformedAddress) {
  EXPECT_EQ(answer(get("/api//v1")).status, 400);
  EXPECT_EQ(answer(get("/api/v1/machines/")).status, 400);
}

TEST_F(RouterTest, RefusesParametersWhereThereAreNone) {
  for (const std::string_view target :
       {"/api/v1/machines?x=1", "/api/v1/machines/chiller-1/assessment?x=1", "/metrics?x=1",
        "/api/v1/events?last=3"}) {
    EXPECT_EQ(answer(get(target)).status, 400) << target;
  }
}

TEST_F(RouterTest, TellsNothingOfItsInsideInAnError) {
  const Answer refused = answer(get("/api/v1/machines/%3Cscript%3E/assessment"));
  EXPECT_THAT(refused.body, Not(HasSubstr("<")));
  EXPECT_THAT(refused.body, Not(HasSubstr("0.1.0")));
}

TEST_F(RouterTest, CutsALongValueInAnError) {
  const std::string target = "/api/v1/machines/" + std::string(500, 'a') + "/assessment";
  EXPECT_LT(answer(get(target)).body.size(), 300U);
}

TEST_F(RouterTest, AsksForATrend) {
  const Action action = router.route(
      get("/api/v1/machines/chiller-1/trend?quantity=power_kW&from=2024-05-02T12:00:00Z&to=2024-"
          "05-03T12:00:00Z&points=96"));
  const auto* ask = std::get_if<AskTrend>(&action);
  ASSERT_NE(ask, nullptr);
  EXPECT_EQ(ask->machine, "chiller-1");
  EXPECT_EQ(ask->request.quantity, Quantity::power);
  EXPECT_EQ(ask->request.to - ask->request.from, std::chrono::hours{24});
  EXPECT_EQ(ask->request.max_points, 96U);
}

struct BadTrend {
  std::string query;
  std::string blamed;
};

class BadTrendParameters : public RouterTest, public testing::WithParamInterface<BadTrend> {};

TEST_P(BadTrendParameters, AreNamedInTheRefusal) {
  const std::string target = "/api/v1/machines/chiller-1/trend?" + GetParam().query;
  const Answer refused = answer(get(target));
  EXPECT_EQ(refused.status, 400);
  EXPECT_THAT(refused.body, HasSubstr(GetParam().blamed));
}

constexpr const char* day = "from=2024-05-02T12:00:00Z&to=2024-05-03T12:00:00Z";

INSTANTIATE_TEST_SUITE_P(
    Of, BadTrendParameters,
    testing::Values(
        BadTrend{"", "parameter quantity is missing"},
        BadTrend{std::string{day}, "parameter quantity is missing"},
        BadTrend{"quantity=power&" + std::string{day}, "parameter quantity is 'power'"},
        BadTrend{"quantity=power_kW&from=yesterday&to=2024-05-03T12:00:00Z",
                 "parameter from is 'yesterday'"},
        BadTrend{"quantity=power_kW&from=2024-05-03T12:00:00Z", "parameter to is missing"},
        BadTrend{"quantity=power_kW&from=2024-05-03T12:00:00Z&to=2024-05-03T12:00:00Z",
                 "from first"},
        BadTrend{"quantity=power_kW&from=2000-05-03T12:00:00Z&to=2024-05-03T12:00:00Z",
                 "at most 3660 days"},
        BadTrend{"quantity=power_kW&points=0&" + std::string{day}, "points is '0'"},
        BadTrend{"quantity=power_kW&points=5001&" + std::string{day}, "points is '5001'"},
        BadTrend{"quantity=power_kW&points=-3&" + std::string{day}, "points is '-3'"},
        BadTrend{"quantity=power_kW&points=1e3&" + std::string{day}, "points is '1e3'"},
        BadTrend{"quantity=power_kW&points=&" + std::string{day}, "points is ''"},
        BadTrend{"quantity=power_kW&quantity=cop&" + std::string{day}, "given twice"},
        BadTrend{"quantity=power_kW&color=red&" + std::string{day}, "'color' is not known"}));

TEST_F(RouterTest, MakesAnAnswerOnceForEachRevision) {
  const Answer first = answer(get("/api/v1/machines"));
  EXPECT_EQ(answer(get("/api/v1/machines")).owner, first.owner);
  ++view.revision;
  EXPECT_NE(answer(get("/api/v1/machines")).owner, first.owner);
}

TEST_F(RouterTest, ShowsNothingOldOfAMachineThatIsNotRead) {
  view.time += std::chrono::hours{2};
  EXPECT_THAT(answer(get("/api/v1/machines/chiller-1/assessment")).body, Not(HasSubstr("59.4")));
  EXPECT_THAT(answer(get("/api/v1/machines")).body, HasSubstr("has not been read since 12:00"));
}

TEST_F(RouterTest, EscapesTheNamesOfTheOwner) {
  EXPECT_THAT(answer(get("/api/v1/machines")).body, Not(HasSubstr("<1>")));
  EXPECT_THAT(answer(get("/api/v1/machines")).body,
              HasSubstr(R"("Heat pump \u003c1\u003e \u0026 \"co\"")"));
}

TEST_F(RouterTest, ServesTheChartsLicence) {
  EXPECT_THAT(answer(get("/licences/dygraphs.txt")).body,
              HasSubstr("Permission is hereby granted"));
}

TEST_F(RouterTest, OpensTheEvents) {
  EXPECT_TRUE(std::holds_alternative<OpenEvents>(router.route(get("/api/v1/events"))));
}

TEST_F(RouterTest, MakesEventsOfOneLineOfData) {
  const std::string text = *router.event();
  EXPECT_THAT(text, testing::StartsWith("id: 1\nevent: change\ndata: {"));
  EXPECT_THAT(text, testing::EndsWith("}\n\n"));
  EXPECT_EQ(std::count(text.begin(), text.end(), '\n'), 4);
}

TEST(HeadOf, CarriesTheSecurityFields) {
  const std::string head = head_of(problem(404, "x"), AfterAnswer::close);
  EXPECT_THAT(head, HasSubstr("Content-Security-Policy: default-src 'self';"));
  EXPECT_THAT(head, Not(HasSubstr("unsafe")));
  EXPECT_THAT(head, HasSubstr("frame-ancestors 'none'"));
  EXPECT_THAT(head, HasSubstr("X-Content-Type-Options: nosniff\r\n"));
  EXPECT_THAT(head, HasSubstr("Cache-Control: no-store\r\n"));
  EXPECT_THAT(head, HasSubstr("Connection: close\r\n"));
  EXPECT_THAT(head, Not(HasSubstr("Access-Control")));
}

TEST(AllowedHosts, HaveNoPortWhereABrowserLeavesItOut) {
  EXPECT_THAT(allowed_hosts("127.0.0.1", 80), testing::Contains("localhost"));
  EXPECT_THAT(allowed_hosts("127.0.0.1", 81), Not(testing::Contains("localhost")));
}

TEST(AllowedHosts, HaveTheAddressThatIsListenedOn) {
  EXPECT_THAT(allowed_hosts("127.0.0.5", 81), testing::Contains("127.0.0.5:81"));
}

}  // namespace
}  // namespace lostwork
