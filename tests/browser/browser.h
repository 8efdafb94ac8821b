// A headless browser, driven by the W3C WebDriver protocol (Debian's chromium-driver).
#pragma once

#include <memory>
#include <string>
#include <string_view>
#include <vector>

#include <boost/json/value.hpp>

namespace lostwork {

class Browser {
 public:
  // Starts chromedriver and a browser with an empty profile of its own. Throws std::runtime_error
  // with one sentence where either is missing or does not start.
  Browser();
  ~Browser();  // ends both and removes the profile
  Browser(const Browser&) = delete;
  Browser& operator=(const Browser&) = delete;

  void open(const std::string& address);
  // The script's "return", as JSON. Throws where the script does.
  boost::json::value run(const std::string& script);
  // Until the expression is true in the page, at most 30 s; false: it did not become true.
  [[nodiscard]] bool comes_true(const std::string& expression);
  void press(const std::string& key);  // one of WebDriver's key codes, or a character
  void type(const std::string& text);
  // As a screen of that size shows it, from now on.
  void screen(int width, int height, bool is_phone);
  void prefer_dark(bool dark);
  // What the page complained of since the last call: errors and refused content.
  [[nodiscard]] std::vector<std::string> complaints();
  // The page from top to bottom, at most so many pixels high, as a PNG file's bytes.
  [[nodiscard]] std::string picture(int most_height);

 private:
  class Implementation;
  std::unique_ptr<Implementation> implementation_;
};

inline constexpr const char* tab_key = "\uE004";
inline constexpr const char* enter_key = "\uE007";

}  // namespace lostwork
