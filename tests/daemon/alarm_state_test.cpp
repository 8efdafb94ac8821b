#include "daemon/alarm_state.h"

#include <fstream>
#include <map>
#include <set>
#include <sstream>
#include <string>
#include <utility>

#include <boost/json.hpp>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using Drawn = std::map<std::pair<AlarmState, AlarmStimulus>, AlarmState>;

const std::map<std::string, AlarmState> states{
    {"A",                  AlarmState::normal},
    {"B",   AlarmState::active_unacknowledged},
    {"C",     AlarmState::active_acknowledged},
    {"D", AlarmState::returned_unacknowledged}
};
const std::map<std::string, AlarmStimulus> stimuli{
    {     "alarm occurs",       AlarmStimulus::occurs},
    {         "re-alarm",       AlarmStimulus::occurs},
    {"returns to normal",      AlarmStimulus::returns},
    {      "acknowledge", AlarmStimulus::acknowledged}
};

// The transitions between the states A to D of ISA-18.2 in tests/reference/alarm_management.json.
Drawn published() {
  std::ifstream file{LOSTWORK_SOURCE "/tests/reference/alarm_management.json"};
  std::stringstream text;
  text << file.rdbuf();
  const boost::json::value all = boost::json::parse(text.str());
  Drawn out;
  for (const auto& arrow : all.at("transitions_core").as_array()) {
    const auto word = [&arrow](std::size_t i) { return std::string{arrow.at(i).as_string()}; };
    if (states.contains(word(0)) && states.contains(word(2))) {
      out[{states.at(word(0)), stimuli.at(word(1))}] = states.at(word(2));
    }
  }
  return out;
}

TEST(AlarmState, HasSixPublishedTransitions) {
  EXPECT_EQ(published().size(), 6U);
}

TEST(AlarmState, GoesAsTheStandardDrawsIt) {
  for (const auto& [from, to] : published()) {
    EXPECT_EQ(after(from.first, from.second), to) << name(from.first);
  }
}

TEST(AlarmState, GoesNowhereElse) {
  const Drawn drawn = published();
  for (const auto& [letter, state] : states) {
    for (std::size_t i = 0; i < static_cast<std::size_t>(AlarmStimulus::count); ++i) {
      const auto stimulus = static_cast<AlarmStimulus>(i);
      if (!drawn.contains({state, stimulus})) {
        EXPECT_EQ(after(state, stimulus), std::nullopt) << letter << i;
      }
    }
  }
}

TEST(AlarmState, HasANameForEach) {
  std::set<std::string_view> names;
  for (const auto& [letter, state] : states) {
    names.insert(name(state));
  }
  EXPECT_EQ(names.size(), 4U);
}

}  // namespace
}  // namespace lostwork
