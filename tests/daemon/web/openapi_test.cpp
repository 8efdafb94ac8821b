// Holds the server to its own description, openapi.json.
#include "daemon/web/router.h"
#include "tests/daemon/web/json_schema.h"
#include "tests/daemon/web/made_up_plant.h"
#include "tests/daemon/web/served_plant.h"
#include "tests/daemon/web/web_client.h"

#include <chrono>
#include <set>
#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

namespace json = boost::json;

constexpr const char* day =
    "quantity=power_kW&from=2024-05-02T12:00:00Z&to=2024-05-03T12:00:00Z&points=20";

class DescribedServer : public testing::Test {
 protected:
  ServedPlant plant;
  json::value description =
      json::parse(ask(plant.port(), get_request(plant.port(), "/api/v1/openapi.json")).body);

  // The schema of the answer that the description promises, or null.
  const json::value* promised(const std::string& path, const std::string& method,
                              const WebReply& reply) {
    const json::object& responses =
        description.at("paths").at(path).at(method).at("responses").as_object();
    const json::value* response = responses.if_contains(std::to_string(reply.status));
    return response == nullptr
               ? nullptr
               : response->at("content").as_object().if_contains(reply.fields.at("content-type"));
  }

  void expect_as_described(const std::string& path, const std::string& method,
                           const WebReply& reply) {
    const json::value* media = promised(path, method, reply);
    ASSERT_NE(media, nullptr) << method << ' ' << path << " answers " << reply.status << ' '
                              << reply.fields.at("content-type");
    if (reply.fields.at("content-type").find("json") != std::string::npos) {
      EXPECT_THAT(schema_faults(json::parse(reply.body), media->at("schema"), description),
                  testing::IsEmpty())
          << path;
    }
  }

  WebReply get(const std::string& target) {
    return ask(plant.port(), get_request(plant.port(), target));
  }
};

TEST_F(DescribedServer, HasTheRoutesOfTheDescriptionAndNoOther) {
  std::set<std::string> described;
  for (const auto& path : description.at("paths").as_object()) {
    for (const auto& method : path.value().as_object()) {
      described.insert((method.key() == "get" ? "GET " : "POST ") + std::string{path.key()});
    }
  }
  std::set<std::string> served;
  for (const Router::Route& route : Router::routes()) {
    served.insert(std::string{route.method} + ' ' + std::string{route.path});
  }
  EXPECT_EQ(described, served);
}

TEST_F(DescribedServer, AnswersEveryPlainGetAsDescribed) {
  for (const std::string path :
       {"/api/v1/machines", "/api/v1/quantities", "/api/v1/alarms", "/api/v1/findings",
        "/api/v1/openapi.json", "/metrics", "/healthz", "/"}) {
    const WebReply reply = get(path);
    EXPECT_EQ(reply.status, 200) << path;
    expect_as_described(path, "get", reply);
  }
}

TEST_F(DescribedServer, AnswersAnAssessmentAsDescribed) {
  for (const std::string id : {"chiller-1", "heat-pump-1"}) {
    const WebReply reply = get("/api/v1/machines/" + id + "/assessment");
    EXPECT_EQ(reply.status, 200);
    expect_as_described("/api/v1/machines/{id}/assessment", "get", reply);
  }
}

TEST_F(DescribedServer, AnswersAMachineThatIsNotReadAsDescribed) {
  plant.change([](PlantView& view) {
    view.time += std::chrono::hours{1};
    view.machines.at(1).last_read.reset();
  });
  expect_as_described("/api/v1/machines", "get", get("/api/v1/machines"));
  expect_as_described("/api/v1/machines/{id}/assessment", "get",
                      get("/api/v1/machines/chiller-1/assessment"));
}

TEST_F(DescribedServer, AnswersATrendAsDescribed) {
  const WebReply reply = get("/api/v1/machines/chiller-1/trend?" + std::string{day});
  EXPECT_EQ(reply.status, 200);
  expect_as_described("/api/v1/machines/{id}/trend", "get", reply);
}

TEST_F(DescribedServer, GivesEveryColumnOfATrendTheSameLength) {
  const json::value trend =
      json::parse(get("/api/v1/machines/chiller-1/trend?" + std::string{day}).body);
  for (const char* column : {"times", "values", "u", "lowest", "highest", "reasons"}) {
    EXPECT_EQ(trend.at(column).as_array().size(), 20U) << column;
  }
}

TEST_F(DescribedServer, NamesEveryQuantityInTheAssessment) {
  const json::value assessment = json::parse(get("/api/v1/machines/chiller-1/assessment").body);
  EXPECT_EQ(assessment.at("quantities").as_object().size(), quantity_count);
}

TEST_F(DescribedServer, RefusesAsDescribed) {
  expect_as_described("/api/v1/machines/{id}/assessment", "get",
                      get("/api/v1/machines/none/assessment"));
  expect_as_described("/api/v1/machines/{id}/trend", "get",
                      get("/api/v1/machines/none/trend?" + std::string{day}));
  expect_as_described("/api/v1/machines/{id}/trend", "get",
                      get("/api/v1/machines/chiller-1/trend"));
  expect_as_described("/api/v1/machines", "get", get("/api/v1/machines?x=1"));
  expect_as_described(
      "/api/v1/machines", "get",
      ask(plant.port(), "GET /api/v1/machines HTTP/1.1\r\nHost: dairy.example\r\n\r\n"));
  expect_as_described("/api/v1/machines", "get",
                      ask(plant.port(), get_request(plant.port(), "/api/v1/machines",
                                                    "Sec-Fetch-Site: cross-site\r\n")));
}

TEST_F(DescribedServer, AnswersAcknowledgementsAsDescribed) {
  const auto expect = [this](int status, const std::string& id, const std::string& body) {
    const std::string target = "/api/v1/alarms/" + id + "/acknowledge";
    const WebReply reply = ask(plant.port(), post_request(plant.port(), target, body));
    EXPECT_EQ(reply.status, status);
    expect_as_described("/api/v1/alarms/{id}/acknowledge", "post", reply);
  };
  expect(200, "chiller-1.drift", R"({"comment":"seen"})");
  expect(409, "chiller-1.drift", "{}");
  expect(404, "chiller-1.none", "{}");
  expect(400, "chiller-1.drift", R"({"user":"me"})");
  expect(413, "chiller-1.drift", std::string(5000, ' '));
  EXPECT_THAT(plant.acknowledged(), testing::ElementsAre("chiller-1.drift: seen"));
}

TEST_F(DescribedServer, SendsEventsAsDescribed) {
  WebClient client{plant.port()};
  client.send(get_request(plant.port(), "/api/v1/events"));
  const WebReply head = client.reply();
  EXPECT_EQ(head.status, 200);
  EXPECT_EQ(head.fields.at("content-type"), "text/event-stream");
  EXPECT_TRUE(client.wait_for("\n\n"));
}

TEST_F(DescribedServer, SendsAChangeOfTheDescribedForm) {
  const PlantView view = made_up_plant();
  Router router{view, [](Instant /*time*/) { return std::chrono::seconds{0}; }, {}};
  const std::string event = *router.event();
  const std::size_t begin = event.find("data: ") + 6;
  const json::value change = json::parse(event.substr(begin, event.size() - begin - 2));
  const json::value schema = description.at("components").at("schemas").at("Change");
  EXPECT_THAT(schema_faults(change, schema, description), testing::IsEmpty());
}

}  // namespace
}  // namespace lostwork
