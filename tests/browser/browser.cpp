#include "tests/browser/browser.h"

#include "tests/browser/driver_process.h"
#include "tests/daemon/web/web_client.h"

#include <stdexcept>
#include <utility>

#include <boost/json.hpp>

namespace lostwork {
namespace {

namespace json = boost::json;

json::object capabilities(const std::string& profile) {
  const json::array arguments{"--headless=new",
                              "--no-sandbox",
                              "--disable-gpu",
                              "--no-first-run",
                              "--disable-background-networking",
                              "--disable-component-update",
                              "--disable-sync",
                              "--disable-dev-shm-usage",
                              "--hide-scrollbars",
                              "--user-data-dir=" + profile};
  const json::object options{
      {"binary", "/usr/bin/chromium"},
      {  "args",           arguments}
  };
  const json::object always{
      {       "browserName",                         "chrome"},
      {"goog:chromeOptions",                          options},
      { "goog:loggingPrefs", json::object{{"browser", "ALL"}}}
  };
  return {
      {"capabilities", json::object{{"alwaysMatch", always}}}
  };
}

std::string decoded_base64(std::string_view text) {
  constexpr std::string_view digits =
      "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
  std::string bytes;
  std::uint32_t bits = 0;
  int count = 0;
  for (const char c : text.substr(0, text.find('='))) {
    bits = (bits << 6U) | static_cast<std::uint32_t>(digits.find(c));
    count += 6;
    if (count >= 8) {
      count -= 8;
      bytes += static_cast<char>((bits >> static_cast<unsigned>(count)) & 0xFFU);
    }
  }
  return bytes;
}

std::string plain(const json::value& text) {
  const json::string& s = text.as_string();
  return {s.data(), s.size()};
}

}  // namespace

class Browser::Implementation {
 public:
  Implementation() {
    const json::value session = ask_driver("POST", "/session", capabilities(profile_.path()));
    session_ = "/session/" + plain(session.at("sessionId"));
  }
  ~Implementation() {
    try {
      command("DELETE", "", {});
    } catch (const std::exception&) {
      // The driver ends the browser when it is ended itself.
    }
  }
  Implementation(const Implementation&) = delete;
  Implementation& operator=(const Implementation&) = delete;

  json::value command(std::string_view method, const std::string& path, const json::value& body) {
    return ask_driver(method, session_ + path, body);
  }

  // Of the browser's own debugging protocol, for what WebDriver has no word for.
  json::value devtools(std::string_view name, const json::object& parameters) {
    return command("POST", "/goog/cdp/execute",
                   json::object{
                       {   "cmd",       name},
                       {"params", parameters}
    });
  }

 private:
  json::value ask_driver(std::string_view method, const std::string& path,
                         const json::value& body) {
    const std::string text = method == "POST" ? json::serialize(body) : "";
    WebClient client{driver_.port()};
    client.send(std::string{method} + ' ' + path +
                " HTTP/1.1\r\nHost: 127.0.0.1:" + std::to_string(driver_.port()) +
                "\r\nContent-Length: " + std::to_string(text.size()) + "\r\n\r\n" + text);
    const WebReply reply = client.reply();
    const json::value answer = json::parse(reply.body.empty() ? "{}" : reply.body);
    if (reply.status != 200) {
      throw std::runtime_error{"the browser refused " + path + ": " +
                               json::serialize(answer).substr(0, 400)};
    }
    return answer.at("value");
  }

  TemporaryDirectory profile_;  // goes after the browser has ended
  DriverProcess driver_;
  std::string session_;
};

Browser::Browser() : implementation_{std::make_unique<Implementation>()} {
  implementation_->command("POST", "/timeouts",
                           json::object{
                               {"script", 40000}
  });
}
Browser::~Browser() = default;

void Browser::open(const std::string& address) {
  implementation_->command("POST", "/url",
                           json::object{
                               {"url", address}
  });
}

json::value Browser::run(const std::string& script) {
  return implementation_->command("POST", "/execute/sync",
                                  json::object{
                                      {"script",        script},
                                      {  "args", json::array{}}
  });
}

bool Browser::comes_true(const std::string& expression) {
  const std::string script =
      "const done = arguments[0]; const end = Date.now() + 30000;"
      "const look = () => { let is = false; try { is = Boolean(" +
      expression +
      "); } catch (e) { is = false; }"
      "if (is || Date.now() > end) { done(is); } else { setTimeout(look, 30); } }; look();";
  return implementation_
      ->command("POST", "/execute/async",
                json::object{
                    {"script",        script},
                    {  "args", json::array{}}
  })
      .as_bool();
}

void Browser::press(const std::string& key) {
  const json::array strokes{
      json::object{{"type", "keyDown"}, {"value", key}},
      json::object{  {"type", "keyUp"}, {"value", key}}
  };
  const json::object keyboard{
      {   "type",      "key"},
      {     "id", "keyboard"},
      {"actions",    strokes}
  };
  implementation_->command("POST", "/actions",
                           json::object{
                               {"actions", json::array{keyboard}}
  });
}

void Browser::type(const std::string& text) {
  for (const char c : text) {
    press(std::string{c});
  }
}

void Browser::screen(int width, int height, bool is_phone) {
  implementation_->devtools(
      "Emulation.setDeviceMetricsOverride",
      {
          {            "width",    width},
          {           "height",   height},
          {"deviceScaleFactor",        1},
          {           "mobile", is_phone}
  });
}

void Browser::prefer_dark(bool dark) {
  const json::array features{
      json::object{{"name", "prefers-color-scheme"}, {"value", dark ? "dark" : "light"}}
  };
  implementation_->devtools("Emulation.setEmulatedMedia", {
                                                              {"features", features}
  });
}

std::vector<std::string> Browser::complaints() {
  const json::value log = implementation_->command("POST", "/se/log",
                                                   json::object{
                                                       {"type", "browser"}
  });
  std::vector<std::string> found;
  for (const json::value& entry : log.as_array()) {
    const std::string level = plain(entry.at("level"));
    if (level == "SEVERE" || level == "WARNING") {
      found.push_back(level + ": " + plain(entry.at("message")));
    }
  }
  return found;
}

std::string Browser::picture(int most_height) {
  const json::value size =
      run("return [document.documentElement.clientWidth, document.documentElement.scrollHeight];");
  const auto height = std::min<std::int64_t>(most_height, size.at(1).to_number<std::int64_t>());
  const json::object clip{
      {     "x",          0},
      {     "y",          0},
      { "width", size.at(0)},
      {"height",     height},
      { "scale",          1}
  };
  const json::value shot = implementation_->devtools(
      "Page.captureScreenshot",
      {
          {               "format", "png"},
          {"captureBeyondViewport",  true},
          {                 "clip",  clip}
  });
  return decoded_base64(plain(shot.at("data")));
}

}  // namespace lostwork
