// A Modbus TCP server on 127.0.0.1 that answers rightly, or with the fault set for an address.
#pragma once

#include <atomic>
#include <cstdint>
#include <map>
#include <mutex>
#include <set>
#include <span>
#include <string_view>
#include <thread>
#include <vector>

namespace lostwork {

enum class Fault {
  none,
  silent,    // takes the request and says nothing
  late,      // answers once the client has given up or asks again
  drip,      // a byte from time to time
  cut,       // half an answer, then the end
  close,     // the end, without an answer
  doubled,   // the answer twice
  trailing,  // three bytes after the answer
  garbage,   // bytes that are no Modbus at all
  wrong_transaction,
  wrong_protocol,
  wrong_length,
  wrong_unit,
  wrong_function,
  fewer_registers,  // one register less, in itself consistent
  huge_byte_count,  // announces more than it sends
  exception_busy,   // 06
  exception_unknown
};

class ModbusServer {
 public:
  explicit ModbusServer(std::uint16_t port = 0);  // listens at once; 0: on a free port
  ~ModbusServer();
  ModbusServer(const ModbusServer&) = delete;
  ModbusServer& operator=(const ModbusServer&) = delete;
  ModbusServer(ModbusServer&&) = delete;
  ModbusServer& operator=(ModbusServer&&) = delete;

  [[nodiscard]] std::uint16_t port() const { return port_; }

  // For requests that begin at this address.
  void set_fault(std::uint16_t address, Fault fault);
  // Requests that touch this address get exception 02.
  void set_illegal(std::uint16_t address);
  void set_word(std::uint16_t address, std::uint16_t word);
  // What an address holds that was not set: no two neighbours are alike. A bit is its last bit.
  [[nodiscard]] static std::uint16_t default_word(std::uint16_t address);

  [[nodiscard]] std::set<std::uint8_t> function_codes() const;
  [[nodiscard]] int connections() const { return connections_; }

 private:
  struct Request;

  void serve();
  // False: the connection is over.
  [[nodiscard]] bool serve_one(int client);
  [[nodiscard]] bool answer(int client, const Request& request);
  [[nodiscard]] bool answer_wrongly(int client, Fault fault, std::vector<std::uint8_t> frame);
  [[nodiscard]] std::vector<std::uint8_t> right_answer(const Request& request);
  // Waits until the client does something, or the server ends.
  void wait_for(int client) const;

  int listener_ = -1;
  int stop_ = -1;
  std::uint16_t port_ = 0;
  mutable std::mutex mutex_;
  std::map<std::uint16_t, Fault> faults_;
  std::map<std::uint16_t, std::uint16_t> words_;
  std::set<std::uint16_t> illegal_;
  std::set<std::uint8_t> function_codes_;
  std::atomic<int> connections_ = 0;
  std::thread thread_;
};

}  // namespace lostwork
