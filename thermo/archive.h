// State as bytes, and back: exact, with a version, refused when damaged.
//
// A struct takes part by one free function, found by its arguments:
//   template <class Archive> void archive(Archive& a, Chart& c) { a(c.sum, c.since, c.name); }
// which serves writing and reading. Numbers keep their bits; little-endian.
#pragma once

#include <array>
#include <chrono>
#include <cstdint>
#include <cstring>
#include <deque>
#include <optional>
#include <stdexcept>
#include <string>
#include <type_traits>
#include <utility>
#include <vector>

namespace lostwork {

class ArchiveWriter {
 public:
  static constexpr bool reading = false;
  template <class... T>
  void operator()(T&... value) {
    (put(value), ...);
  }
  [[nodiscard]] const std::vector<std::uint8_t>& bytes() const { return bytes_; }

 private:
  void raw(const void* from, std::size_t size) {
    const auto* p = static_cast<const std::uint8_t*>(from);
    bytes_.insert(bytes_.end(), p, p + size);
  }
  template <class T>
  void put(T& value) {
    if constexpr (std::is_arithmetic_v<T> || std::is_enum_v<T>) {
      raw(&value, sizeof value);
    } else {
      archive(*this, value);
    }
  }
  template <class R, class P>
  void put(std::chrono::duration<R, P>& value) {
    R count = value.count();
    put(count);
  }
  template <class C, class D>
  void put(std::chrono::time_point<C, D>& value) {
    D since = value.time_since_epoch();
    put(since);
  }
  void put(std::string& text) {
    auto size = static_cast<std::uint32_t>(text.size());
    put(size);
    raw(text.data(), text.size());
  }
  template <class T>
  void put(std::optional<T>& value) {
    bool there = value.has_value();
    put(there);
    if (there) {
      put(*value);
    }
  }
  template <class A, class B>
  void put(std::pair<A, B>& value) {
    put(value.first);
    put(value.second);
  }
  template <class T, std::size_t n>
  void put(std::array<T, n>& values) {
    for (T& value : values) {
      put(value);
    }
  }
  template <class T>
  void put(std::vector<T>& values) {
    put_all(values);
  }
  template <class T>
  void put(std::deque<T>& values) {
    put_all(values);
  }
  template <class C>
  void put_all(C& values) {
    auto size = static_cast<std::uint32_t>(values.size());
    put(size);
    for (auto& value : values) {
      put(value);
    }
  }

  std::vector<std::uint8_t> bytes_;
};

// Thrown by ArchiveReader; caught where a stored state is taken up.
class ArchiveDamaged : public std::runtime_error {
 public:
  using std::runtime_error::runtime_error;
};

class ArchiveReader {
 public:
  static constexpr bool reading = true;
  explicit ArchiveReader(const std::vector<std::uint8_t>& bytes) : bytes_{bytes} {}
  template <class... T>
  void operator()(T&... value) {
    (get(value), ...);
  }
  [[nodiscard]] bool at_end() const { return at_ == bytes_.size(); }

 private:
  void raw(void* to, std::size_t size) {
    if (size > bytes_.size() - at_) {
      throw ArchiveDamaged{"the stored state ends early"};
    }
    std::memcpy(to, bytes_.data() + at_, size);
    at_ += size;
  }
  template <class T>
  void get(T& value) {
    if constexpr (std::is_same_v<T, bool>) {
      std::uint8_t byte = 0;
      raw(&byte, 1);
      value = byte != 0;
    } else if constexpr (std::is_arithmetic_v<T> || std::is_enum_v<T>) {
      raw(&value, sizeof value);
    } else {
      archive(*this, value);
    }
  }
  template <class R, class P>
  void get(std::chrono::duration<R, P>& value) {
    R count{};
    get(count);
    value = std::chrono::duration<R, P>{count};
  }
  template <class C, class D>
  void get(std::chrono::time_point<C, D>& value) {
    D since{};
    get(since);
    value = std::chrono::time_point<C, D>{since};
  }
  void get(std::string& text) {
    text.resize(size());
    raw(text.data(), text.size());
  }
  template <class T>
  void get(std::optional<T>& value) {
    bool there = false;
    get(there);
    value.reset();
    if (there) {
      get(value.emplace());
    }
  }
  template <class A, class B>
  void get(std::pair<A, B>& value) {
    get(value.first);
    get(value.second);
  }
  template <class T, std::size_t n>
  void get(std::array<T, n>& values) {
    for (T& value : values) {
      get(value);
    }
  }
  template <class T>
  void get(std::vector<T>& values) {
    get_all(values);
  }
  template <class T>
  void get(std::deque<T>& values) {
    get_all(values);
  }
  template <class C>
  void get_all(C& values) {
    values.clear();
    const std::uint32_t n = size();
    for (std::uint32_t i = 0; i < n; ++i) {
      get(values.emplace_back());
    }
  }
  std::uint32_t size() {
    std::uint32_t n = 0;
    get(n);
    if (n > bytes_.size() - at_) {  // each element takes at least a byte
      throw ArchiveDamaged{"the stored state has an impossible length"};
    }
    return n;
  }

  const std::vector<std::uint8_t>& bytes_;
  std::size_t at_ = 0;
};

}  // namespace lostwork
