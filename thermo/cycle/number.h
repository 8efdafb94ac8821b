// The numbers of the ledger: values with their derivatives by every input of one machine.
#pragma once

#include "thermo/measure/dual.h"
#include "thermo/measure/uncertainty.h"
#include "thermo/result.h"
#include "thermo/role.h"

#include <cstddef>
#include <type_traits>

namespace lostwork {

// The measured inputs are the roles from cold_in_temperature to power, in their order.
inline constexpr std::size_t measured_inputs = static_cast<std::size_t>(Role::power) + 1;
inline constexpr std::size_t casing_loss_input = measured_inputs;          // share of the power
inline constexpr std::size_t suction_quality_input = measured_inputs + 1;  // of wet vapour
inline constexpr std::size_t input_count = measured_inputs + 2;

using Number = Dual<input_count>;
using Errors = InputErrors<input_count>;

template <class T>
struct IsResult : std::false_type {};
template <class T>
struct IsResult<Result<T>> : std::true_type {};

// f of the values, or the first reason among them. f answers with a value or with a result.
template <class F, class... T>
[[nodiscard]] auto combine(const F& f, const Result<T>&... values) {
  using Answer = std::invoke_result_t<F, const T&...>;
  using Combined = std::conditional_t<IsResult<Answer>::value, Answer, Result<Answer>>;
  const Reason* why = nullptr;
  const auto look = [&why](const auto& value) {
    if (why == nullptr && !value) {
      why = &value.error();
    }
  };
  (look(values), ...);
  if (why != nullptr) {
    return Combined{tl::unexpected{*why}};
  }
  return Combined{f(*values...)};
}

}  // namespace lostwork
