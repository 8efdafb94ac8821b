// A blocking HTTP client for tests, down to the bytes.
#pragma once

#include <chrono>
#include <cstdint>
#include <map>
#include <memory>
#include <string>
#include <string_view>

namespace lostwork {

struct WebReply {
  int status = 0;                             // 0: the connection ended before a whole head came
  std::map<std::string, std::string> fields;  // names in lower case
  std::string body;
};

class WebClient {
 public:
  explicit WebClient(std::uint16_t port);
  ~WebClient();
  WebClient(const WebClient&) = delete;
  WebClient& operator=(const WebClient&) = delete;

  void send(std::string_view bytes);  // as many as go; a peer that has closed is no error
  // One reply. To a HEAD there is no body.
  [[nodiscard]] WebReply reply(bool to_head = false);
  // Reads on until the text has come; false: the connection ended first.
  [[nodiscard]] bool wait_for(std::string_view text);
  // Reads until the end of the connection, and says how many bytes came.
  std::size_t read_to_end();

 private:
  class Implementation;
  std::unique_ptr<Implementation> implementation_;
};

// "GET target" with the right Host for that port, and more field lines if any.
[[nodiscard]] std::string get_request(std::uint16_t port, std::string_view target,
                                      std::string_view more_fields = "");
[[nodiscard]] std::string post_request(std::uint16_t port, std::string_view target,
                                       std::string_view body, std::string_view more_fields = "");
// One request on a connection of its own.
[[nodiscard]] WebReply ask(std::uint16_t port, std::string_view request);

}  // namespace lostwork
