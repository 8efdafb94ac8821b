// Runs what blocks on another thread, and comes back.
#pragma once

#include <memory>
#include <optional>
#include <type_traits>
#include <utility>

#include <boost/asio/awaitable.hpp>
#include <boost/asio/post.hpp>
#include <boost/asio/redirect_error.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/this_coro.hpp>
#include <boost/asio/thread_pool.hpp>
#include <boost/asio/use_awaitable.hpp>

namespace lostwork {

// The result of job(), which runs in the pool and must not throw; the coroutine goes on on its own
// executor, which is to be run by one thread. The pool is joined before that executor's context
// goes.
template <class Job>
boost::asio::awaitable<std::invoke_result_t<Job&>> on_thread(boost::asio::thread_pool& pool,
                                                             Job job) {
  using Outcome = std::invoke_result_t<Job&>;
  struct Pending {
    explicit Pending(const boost::asio::any_io_executor& executor)
        : done{executor, boost::asio::steady_timer::time_point::max()} {}
    std::optional<Outcome> outcome;
    boost::asio::steady_timer done;  // cancelled when the outcome is there
  };
  const boost::asio::any_io_executor executor = co_await boost::asio::this_coro::executor;
  const auto pending = std::make_shared<Pending>(executor);
  auto back = [pending](Outcome&& outcome) {
    pending->outcome.emplace(std::move(outcome));
    pending->done.cancel();
  };
  auto there = [job = std::move(job), back = std::move(back), executor]() mutable {
    boost::asio::post(
        executor, [back = std::move(back), answer = job()]() mutable { back(std::move(answer)); });
  };
  boost::asio::post(pool, std::move(there));
  boost::system::error_code cancelled;
  auto token = boost::asio::redirect_error(boost::asio::use_awaitable, cancelled);
  while (!pending->outcome) {
    co_await pending->done.async_wait(token);
  }
  co_return std::move(*pending->outcome);
}

}  // namespace lostwork
