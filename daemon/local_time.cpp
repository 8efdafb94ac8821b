#include "daemon/local_time.h"

#include <array>
#include <charconv>
#include <cstdint>
#include <cstdio>
#include <date/tz.h>
#include <exception>

namespace lostwork {
namespace {

using std::chrono::days;
using std::chrono::floor;
using std::chrono::hours;
using std::chrono::milliseconds;
using std::chrono::minutes;
using std::chrono::seconds;

struct Wall {
  std::chrono::year_month_day day;
  std::chrono::hh_mm_ss<seconds> time;
};

Wall wall(Instant time, const UtcOffset& offset) {
  const auto local = floor<seconds>(time) + offset(time);
  const auto day = floor<days>(local);
  return {.day = std::chrono::year_month_day{day},
          .time = std::chrono::hh_mm_ss<seconds>{local - day}};
}

std::string day_of(const Wall& then, const Wall& now) {
  static constexpr std::array<const char*, 12> months{
      "January", "February", "March",     "April",   "May",      "June",
      "July",    "August",   "September", "October", "November", "December"};
  std::string text = std::to_string(static_cast<unsigned>(then.day.day())) + ' ' +
                     months.at(static_cast<unsigned>(then.day.month()) - 1U);
  if (then.day.year() != now.day.year()) {
    text += ' ' + std::to_string(static_cast<int>(then.day.year()));
  }
  return text;
}

// Reads fixed fields from the left; any mismatch empties it for good.
class Fields {
 public:
  explicit Fields(std::string_view text) : rest_{text} {}

  int digits(std::size_t count) {
    int value = 0;
    if (rest_.size() < count) {
      ok_ = false;
      return 0;
    }
    const auto [end, error] = std::from_chars(rest_.data(), rest_.data() + count, value);
    ok_ = ok_ && error == std::errc{} && end == rest_.data() + count && rest_.front() != '-';
    rest_.remove_prefix(count);
    return value;
  }
  bool take(char c) {
    if (rest_.empty() || rest_.front() != c) {
      return false;
    }
    rest_.remove_prefix(1);
    return true;
  }
  void need(char c) { ok_ = take(c) && ok_; }
  void refuse_unless(bool condition) { ok_ = ok_ && condition; }
  [[nodiscard]] std::size_t digits_ahead() const {
    const auto end = rest_.find_first_not_of("0123456789");
    return end == std::string_view::npos ? rest_.size() : end;
  }
  [[nodiscard]] bool whole() const { return ok_ && rest_.empty(); }

 private:
  std::string_view rest_;
  bool ok_ = true;
};

milliseconds fraction(Fields& in) {
  const std::size_t count = in.digits_ahead();
  in.refuse_unless(count >= 1 && count <= 3);
  if (count < 1 || count > 3) {
    return milliseconds{0};
  }
  static constexpr std::array<int, 4> scale{0, 100, 10, 1};
  return milliseconds{in.digits(count) * scale.at(count)};
}

minutes zone(Fields& in) {
  if (in.take('Z')) {
    return minutes{0};
  }
  const bool east = in.take('+');
  if (!east) {
    in.need('-');
  }
  const int hour = in.digits(2);
  in.need(':');
  const int minute = in.digits(2);
  in.refuse_unless(hour <= 14 && minute <= 59);  // the farthest zone in use is UTC+14
  const minutes offset = hours{hour} + minutes{minute};
  return east ? offset : -offset;
}

}  // namespace

std::optional<UtcOffset> utc_offset_of(const std::string& timezone) {
  try {
    const date::time_zone* zone = date::locate_zone(timezone);
    return [zone](Instant time) { return zone->get_info(floor<seconds>(time)).offset; };
  } catch (const std::exception&) {
    return std::nullopt;
  }
}

std::string time_text(Instant time, Instant now, const UtcOffset& offset) {
  const Wall then = wall(time, offset);
  const Wall today = wall(now, offset);
  std::array<char, 8> clock{};
  std::snprintf(clock.data(), clock.size(), "%02d:%02d",
                static_cast<int>(then.time.hours().count()),
                static_cast<int>(then.time.minutes().count()));
  return then.day == today.day ? clock.data() : day_of(then, today) + ", " + clock.data();
}

std::string day_text(Instant time, Instant now, const UtcOffset& offset) {
  return day_of(wall(time, offset), wall(now, offset));
}

std::string iso_text(Instant time) {
  const auto day = floor<days>(time);
  const std::chrono::year_month_day date{day};
  const std::chrono::hh_mm_ss<milliseconds> clock{time - day};
  std::array<char, 48> text{};
  std::snprintf(text.data(), text.size(), "%04d-%02u-%02uT%02d:%02d:%02d",
                static_cast<int>(date.year()), static_cast<unsigned>(date.month()),
                static_cast<unsigned>(date.day()), static_cast<int>(clock.hours().count()),
                static_cast<int>(clock.minutes().count()),
                static_cast<int>(clock.seconds().count()));
  std::string whole{text.data()};
  if (const auto ms = clock.subseconds().count(); ms != 0) {
    std::snprintf(text.data(), text.size(), ".%03d", static_cast<int>(ms));
    whole += text.data();
  }
  return whole + 'Z';
}

std::optional<Instant> instant_of(std::string_view iso) {
  Fields in{iso};
  const std::chrono::year year{in.digits(4)};
  in.need('-');
  const std::chrono::month month{static_cast<unsigned>(in.digits(2))};
  in.need('-');
  const std::chrono::year_month_day date{year, month,
                                         std::chrono::day(static_cast<unsigned>(in.digits(2)))};
  in.need('T');
  const int hour = in.digits(2);
  in.need(':');
  const int minute = in.digits(2);
  const int second = in.take(':') ? in.digits(2) : 0;
  const milliseconds part = in.take('.') ? fraction(in) : milliseconds{0};
  const minutes offset = zone(in);
  in.refuse_unless(date.ok() && year >= std::chrono::year{1970} && hour <= 23 && minute <= 59 &&
                   second <= 59);
  if (!in.whole()) {
    return std::nullopt;
  }
  return Instant{std::chrono::sys_days{date}} + hours{hour} + minutes{minute} + seconds{second} +
         part - offset;
}

}  // namespace lostwork
