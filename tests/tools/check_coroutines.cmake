# Fails on coroutine statements that g++ 12.2 translates wrongly: braces, a lambda or ?: in a statement with
# co_await, or co_await in the condition of if, while, for or switch. Name the value first.
cmake_policy(VERSION 3.25)
file(GLOB_RECURSE sources ${ROOT}/daemon/*.cpp ${ROOT}/daemon/*.h ${ROOT}/tests/*.cpp ${ROOT}/tests/*.h)
set(bad "")
foreach(source IN LISTS sources)
  file(READ ${source} text)
  # Semicolons and brackets mean something in CMake's lists.
  string(REPLACE ";" "@" text "${text}")
  string(REGEX REPLACE "//[^\n]*" "" text "${text}")
  string(REGEX REPLACE "[][]" "|" text "${text}")
  string(REGEX REPLACE "[ \n]+" " " text "${text}")
  string(REGEX MATCHALL "[^@{}]*co_await[^@{}]*[@{}]" statements "${text}")
  foreach(statement IN LISTS statements)
    if(statement MATCHES "[{}]$" OR statement MATCHES "[?]" OR
       statement MATCHES "(^|[^a-z_])(if|while|for|switch) *[(].*co_await")
      string(STRIP "${statement}" statement)
      string(APPEND bad "\n  ${source}: ${statement}")
    endif()
  endforeach()
endforeach()
if(bad)
  message(FATAL_ERROR "statements with co_await that g++ 12.2 translates wrongly:${bad}")
endif()
