// Checks JSON against the part of JSON Schema that openapi.json uses: type, enum, properties,
// required, additionalProperties, items, oneOf, $ref, pattern, minimum, maximum, maxLength.
// A keyword or a pattern that is not known is an error, so that none is passed over in silence.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include <boost/json.hpp>

namespace lostwork {

// What is wrong, each with its place in `document`; empty: nothing. References are looked up in
// `root`.
[[nodiscard]] std::vector<std::string> schema_faults(const boost::json::value& document,
                                                     const boost::json::value& schema,
                                                     const boost::json::value& root);

}  // namespace lostwork
