// The server on the wire: limits, deadlines, slow and rude clients.
#include "daemon/web/server.h"

#include "tests/daemon/web/made_up_plant.h"
#include "tests/daemon/web/served_plant.h"
#include "tests/daemon/web/web_client.h"

#include <chrono>
#include <future>
#include <memory>
#include <stdexcept>
#include <string>
#include <vector>

#include <boost/asio/io_context.hpp>
#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using namespace std::chrono_literals;
using namespace std::string_literals;
using testing::Contains;
using testing::HasSubstr;
using testing::Not;

// Deadlines that a test can wait for: for clients that are to miss them.
WebLimits short_times() {
  WebLimits limits;
  limits.request_time = 300ms;
  limits.idle_time = 300ms;
  return limits;
}

// Events that a test need not wait for, and the usual deadlines: a client on a busy machine keeps
// them.
WebLimits quick_events() {
  WebLimits limits;
  limits.event_period = 1ms;
  limits.heartbeat = 100ms;
  return limits;
}

constexpr const char* trend_target =
    "/api/v1/machines/chiller-1/trend?quantity=power_kW&from=2024-05-02T12:00:00Z&"
    "to=2024-05-03T12:00:00Z&points=2";

TEST(WebServerAddress, MustBeLoopback) {
  boost::asio::io_context io;
  const PlantView view = made_up_plant();
  const WebServer::Parts parts{.view = view, .history = {}, .acknowledge = {}, .log = {}};
  try {
    const WebServer server{
        io, {.listen = "0.0.0.0:0", .limits = {}},
         parts
    };
    FAIL() << "it listens to everyone";
  } catch (const std::runtime_error& refusal) {
    EXPECT_THAT(refusal.what(), HasSubstr("until there are user accounts"));
  }
}

TEST(WebServerAddress, MustBeFree) {
  const ServedPlant first;
  boost::asio::io_context io;
  const PlantView view = made_up_plant();
  const WebServer::Parts parts{.view = view, .history = {}, .acknowledge = {}, .log = {}};
  const std::string listen = "127.0.0.1:" + std::to_string(first.port());
  try {
    const WebServer second{
        io, {.listen = listen, .limits = {}},
         parts
    };
    FAIL() << "two servers share a port";
  } catch (const std::runtime_error& refusal) {
    EXPECT_THAT(refusal.what(), HasSubstr("another program listens there already"));
  }
}

TEST(WebServerZone, IsUtcWhereTheNameIsUnknown) {
  boost::asio::io_context io;
  PlantView view = made_up_plant();
  view.timezone = "Nowhere/Nothing";
  std::vector<std::string> log;
  const WebServer::Parts parts{
      .view = view, .history = {}, .acknowledge = {}, .log = [&log](std::string_view line) {
        log.emplace_back(line);
      }};
  const WebServer server{
      io, {.listen = "127.0.0.1:0", .limits = {}},
       parts
  };
  EXPECT_THAT(log, Contains(HasSubstr("times are shown in UTC")));
}

TEST(WebConnection, AnswersRequestsThatComeTogetherInTheirOrder) {
  const ServedPlant plant;
  WebClient client{plant.port()};
  client.send(get_request(plant.port(), "/healthz") + get_request(plant.port(), "/nothing") +
              get_request(plant.port(), trend_target) + get_request(plant.port(), "/metrics"));
  EXPECT_EQ(client.reply().fields.at("content-type"), "application/json");
  EXPECT_EQ(client.reply().status, 404);
  EXPECT_THAT(client.reply().body, HasSubstr("\"power_kW\""));
  EXPECT_THAT(client.reply().body, HasSubstr("# EOF"));
}

TEST(WebConnection, ClosesWhenAsked) {
  const ServedPlant plant;
  WebClient client{plant.port()};
  client.send(get_request(plant.port(), "/healthz", "Connection: close\r\n"));
  EXPECT_EQ(client.reply().fields.at("connection"), "close");
  EXPECT_EQ(client.read_to_end(), 0U);
}

TEST(WebConnection, AnswersHeadWithTheHeadOfGet) {
  const ServedPlant plant;
  WebClient client{plant.port()};
  const std::string host = "Host: 127.0.0.1:" + std::to_string(plant.port()) + "\r\n\r\n";
  for (const std::string target : {"/", "/api/v1/machines", "/metrics", "/style.css", "/nothing"}) {
    client.send(get_request(plant.port(), target));
    const WebReply full = client.reply();
    client.send("HEAD " + target + " HTTP/1.1\r\n" + host);
    const WebReply head = client.reply(true);
    EXPECT_EQ(head.status, full.status) << target;
    EXPECT_EQ(head.fields, full.fields) << target;
  }
}

TEST(WebConnection, AnswersHeadOfTheEventsAndGoesOn) {
  const ServedPlant plant;
  WebClient client{plant.port()};
  client.send("HEAD /api/v1/events HTTP/1.1\r\nHost: 127.0.0.1:" + std::to_string(plant.port()) +
              "\r\n\r\n" + get_request(plant.port(), "/healthz"));
  EXPECT_EQ(client.reply(true).fields.at("content-type"), "text/event-stream");
  EXPECT_EQ(client.reply().status, 200);
}

TEST(WebConnection, ChangesNothingOnGetAndHead) {
  ServedPlant plant;
  for (const std::string method : {"GET", "HEAD"}) {
    WebClient client{plant.port()};
    client.send(method +
                " /api/v1/alarms/chiller-1.drift/acknowledge HTTP/1.1\r\nHost: 127.0.0.1:" +
                std::to_string(plant.port()) + "\r\n\r\n");
    const WebReply reply = client.reply(method == "HEAD");
    EXPECT_EQ(reply.status, 405);
  }
  EXPECT_THAT(plant.acknowledged(), testing::IsEmpty());
}

struct Refused {
  std::string name;
  std::string request;  // HOST stands for the right one
  int status;
};

void PrintTo(const Refused& c, std::ostream* out) {
  *out << c.name;
}

class RefusedRequest : public testing::TestWithParam<Refused> {};

TEST_P(RefusedRequest, GetsItsStatusAsAProblem) {
  const ServedPlant plant;
  std::string request = GetParam().request;
  if (const std::size_t at = request.find("HOST"); at != std::string::npos) {
    request.replace(at, 4, "Host: 127.0.0.1:" + std::to_string(plant.port()));
  }
  const WebReply reply = ask(plant.port(), request);
  EXPECT_EQ(reply.status, GetParam().status);
  EXPECT_EQ(reply.fields.at("content-type"), "application/problem+json");
}

INSTANTIATE_TEST_SUITE_P(
    Wire, RefusedRequest,
    testing::Values(
        Refused{"WithoutHost", "GET / HTTP/1.1\r\n\r\n", 400},
        Refused{"WithTwoHosts", "GET / HTTP/1.1\r\nHOST\r\nHost: elsewhere\r\n\r\n", 400},
        Refused{"ForAnotherHost", "GET / HTTP/1.1\r\nHost: dairy.example\r\n\r\n", 421},
        Refused{"WithoutHostIn10", "GET / HTTP/1.0\r\n\r\n", 400},
        Refused{"OfAnotherVersion", "GET / HTTP/2.0\r\nHOST\r\n\r\n", 505},
        Refused{"ThatIsNoHttp", "\x16\x03\x01\x02\x00\x01\r\n\r\n"s, 400},
        Refused{"WithASpaceInAName", "GET / HTTP/1.1\r\nHOST\r\nA b: c\r\n\r\n", 400},
        Refused{"WithALongHeader",
                "GET / HTTP/1.1\r\nHOST\r\nX: " + std::string(20000, 'a') + "\r\n\r\n", 431},
        Refused{"WithALongAddress", "GET /" + std::string(3000, 'a') + " HTTP/1.1\r\nHOST\r\n\r\n",
                414},
        Refused{"WithALongBody",
                "POST /api/v1/alarms/a/acknowledge HTTP/1.1\r\nHOST\r\nContent-Length: 1000000\r\n"
                "\r\n" +
                    std::string(100000, ' '),
                413},
        Refused{"WithALongBodyInChunks",
                "POST /api/v1/alarms/a/acknowledge HTTP/1.1\r\nHOST\r\nTransfer-Encoding: "
                "chunked\r\n\r\n2000\r\n" +
                    std::string(0x2000, ' ') + "\r\n0\r\n\r\n",
                413},
        Refused{"WithTwoLengths",
                "POST / HTTP/1.1\r\nHOST\r\nContent-Length: 1\r\nContent-Length: 2\r\n\r\nab", 400},
        Refused{"WithAWrongLength", "POST / HTTP/1.1\r\nHOST\r\nContent-Length: -1\r\n\r\n", 400},
        Refused{"WithLengthAndChunks",
                "POST / HTTP/1.1\r\nHOST\r\nContent-Length: 5\r\nTransfer-Encoding: "
                "chunked\r\n\r\n0\r\n\r\n",
                400}),
    [](const auto& tested) { return tested.param.name; });

TEST(SlowClient, ThatNeverEndsItsHeaderIsCut) {
  const ServedPlant plant{short_times()};
  WebClient client{plant.port()};
  client.send("GET / HTTP/1.1\r\nHost: ");
  EXPECT_EQ(client.read_to_end(), 0U);
}

// Each byte comes in time, the whole does not.
TEST(SlowClient, ThatDripsItsHeaderIsCut) {
  const ServedPlant plant{short_times()};
  WebClient client{plant.port()};
  auto end = std::async(std::launch::async, [&client] { return client.read_to_end(); });
  client.send("G");
  while (end.wait_for(20ms) != std::future_status::ready) {
    client.send("E");
  }
  EXPECT_EQ(end.get(), 0U);
}

TEST(SlowClient, ThatNeverSendsItsBodyIsCut) {
  ServedPlant plant{short_times()};
  WebClient client{plant.port()};
  client.send("POST /api/v1/alarms/chiller-1.drift/acknowledge HTTP/1.1\r\nHost: 127.0.0.1:" +
              std::to_string(plant.port()) +
              "\r\nContent-Type: application/json\r\nContent-Length: 10\r\n\r\n{");
  EXPECT_EQ(client.read_to_end(), 0U);
  EXPECT_THAT(plant.acknowledged(), testing::IsEmpty());
}

TEST(SlowClient, ThatSaysNothingIsCut) {
  const ServedPlant plant{short_times()};
  WebClient client{plant.port()};
  EXPECT_EQ(client.read_to_end(), 0U);
}

TEST(SlowClient, ThatWaitsToBeToldToGoOnIsTold) {
  const ServedPlant plant;
  WebClient client{plant.port()};
  client.send("POST /api/v1/alarms/chiller-1.drift/acknowledge HTTP/1.1\r\nHost: 127.0.0.1:" +
              std::to_string(plant.port()) +
              "\r\nContent-Type: application/json\r\nExpect: 100-continue\r\n"
              "Content-Length: 2\r\n\r\n");
  EXPECT_EQ(client.reply().status, 100);
  client.send("{}");
  EXPECT_EQ(client.reply().status, 200);
}

TEST(ManyClients, BeyondTheLimitAreTurnedAway) {
  WebLimits limits;
  limits.connections = 3;
  const ServedPlant plant{limits};
  std::vector<std::unique_ptr<WebClient>> clients;
  for (int i = 0; i < 3; ++i) {
    clients.push_back(std::make_unique<WebClient>(plant.port()));
    clients.back()->send(get_request(plant.port(), "/healthz"));
    EXPECT_EQ(clients.back()->reply().status, 200);
  }
  WebClient one_more{plant.port()};
  EXPECT_EQ(one_more.read_to_end(), 0U);
}

TEST(ManyClients, MakeRoomWhenTheyGo) {
  WebLimits limits;
  limits.connections = 1;
  const ServedPlant plant{limits};
  for (int i = 0; i < 3; ++i) {
    WebClient client{plant.port()};
    client.send(get_request(plant.port(), "/healthz", "Connection: close\r\n"));
    EXPECT_EQ(client.reply().status, 200);
    EXPECT_EQ(client.read_to_end(), 0U);
  }
}

TEST(EventStream, TellsAChangeAtOnce) {
  ServedPlant plant{quick_events()};
  WebClient client{plant.port()};
  client.send(get_request(plant.port(), "/api/v1/events"));
  EXPECT_TRUE(client.wait_for("Chiller 1 needs 6 % more power"));
  plant.change([](PlantView& view) { view.time += 2min; });
  EXPECT_TRUE(client.wait_for("Chiller 1 has not been read since 13:00"));
}

TEST(EventStream, IsNeverSilentForLong) {
  const ServedPlant plant{quick_events()};
  WebClient client{plant.port()};
  client.send(get_request(plant.port(), "/api/v1/events"));
  EXPECT_TRUE(client.wait_for("event: alive\ndata: {}\n\n"));
}

TEST(EventStream, BeyondTheLimitIsAskedToComeBack) {
  WebLimits limits = quick_events();
  limits.event_streams = 1;
  const ServedPlant plant{limits};
  WebClient first{plant.port()};
  first.send(get_request(plant.port(), "/api/v1/events"));
  EXPECT_TRUE(first.wait_for("event: change"));
  const WebReply second = ask(plant.port(), get_request(plant.port(), "/api/v1/events"));
  EXPECT_EQ(second.status, 503);
  EXPECT_EQ(second.fields.at("retry-after"), "30");
}

// The client never reads: the buffers of both ends fill up, then it is dropped. A new one gets its
// place.
TEST(EventStream, ThatIsNeverReadIsDropped) {
  WebLimits limits = quick_events();
  limits.write_time = 300ms;
  limits.event_streams = 1;
  ServedPlant plant{limits};
  plant.change([](PlantView& view) { view.machines.front().name = std::string(60000, 'a'); });
  WebClient deaf{plant.port()};
  deaf.send(get_request(plant.port(), "/api/v1/events"));
  EXPECT_TRUE(deaf.wait_for("event: change"));
  const auto deadline = std::chrono::steady_clock::now() + 60s;
  int status = 503;
  while (status == 503 && std::chrono::steady_clock::now() < deadline) {
    plant.change([](PlantView& view) { view.time += 1ms; });
    WebClient next{plant.port()};
    next.send(get_request(plant.port(), "/api/v1/events"));
    status = next.reply().status;
  }
  EXPECT_EQ(status, 200);
}

TEST(TrendOnTheWire, IsAskedOfTheHistory) {
  const ServedPlant plant;
  const WebReply reply = ask(plant.port(), get_request(plant.port(), trend_target));
  EXPECT_EQ(reply.status, 200);
  EXPECT_THAT(reply.body, HasSubstr("\"reasons\":[null,\"machine_off\"]"));
}

TEST(TrendOnTheWire, ThatFailsTellsTheLogAndNotTheClient) {
  ServedPlant plant{{}, [](const TrendRequest&) -> std::vector<Bucket> {
                      throw std::runtime_error{"no such table: hours in /var/lib/plant.db"};
                    }};
  const WebReply reply = ask(plant.port(), get_request(plant.port(), trend_target));
  EXPECT_EQ(reply.status, 503);
  EXPECT_THAT(reply.body, Not(HasSubstr("table")));
  EXPECT_THAT(reply.body, Not(HasSubstr("/var")));
  EXPECT_THAT(plant.log(), Contains(HasSubstr("no such table")));
}

// One question is with the store, one waits; the third is turned away.
TEST(TrendOnTheWire, WaitsOnlyBehindSoMany) {
  WebLimits limits;
  limits.trends_waiting = 2;
  std::promise<void> go;
  const std::shared_future<void> gate = go.get_future().share();
  const ServedPlant plant{limits, [gate](const TrendRequest& request) {
                            gate.wait();
                            return made_up_trend(request);
                          }};
  WebClient first{plant.port()};
  WebClient second{plant.port()};
  first.send(get_request(plant.port(), trend_target));
  second.send(get_request(plant.port(), trend_target));
  int status = 0;
  std::vector<std::unique_ptr<WebClient>> others;
  while (status != 503) {  // both are waiting as soon as one more is refused
    others.push_back(std::make_unique<WebClient>(plant.port()));
    others.back()->send(get_request(plant.port(), trend_target));
    auto third = std::async(std::launch::async, [&others] { return others.back()->reply(); });
    if (third.wait_for(60s) != std::future_status::ready) {
      go.set_value();
      FAIL() << "a third question waits";
    }
    status = third.get().status;
  }
  go.set_value();
  EXPECT_EQ(first.reply().status, 200);
  EXPECT_EQ(second.reply().status, 200);
}

TEST(TrendOnTheWire, DoesNotHoldUpOtherAnswers) {
  std::promise<void> go;
  const std::shared_future<void> gate = go.get_future().share();
  const ServedPlant plant{{}, [gate](const TrendRequest& request) {
                            gate.wait();
                            return made_up_trend(request);
                          }};
  WebClient waiting{plant.port()};
  waiting.send(get_request(plant.port(), trend_target));
  EXPECT_EQ(ask(plant.port(), get_request(plant.port(), "/healthz")).status, 200);
  go.set_value();
  EXPECT_EQ(waiting.reply().status, 200);
}

TEST(WebServerEnd, ClosesWhatIsOpen) {
  auto plant = std::make_unique<ServedPlant>(quick_events());
  WebClient stream{plant->port()};
  stream.send(get_request(plant->port(), "/api/v1/events"));
  EXPECT_TRUE(stream.wait_for("event: change"));
  WebClient idle{plant->port()};
  plant.reset();
  stream.read_to_end();
  EXPECT_EQ(idle.read_to_end(), 0U);
}

}  // namespace
}  // namespace lostwork
