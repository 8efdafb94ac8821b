# The page's files, ours and those of Debian's libjs-dygraphs, as a source of lostwork_daemon.
find_path(dygraphs_dir dygraph.min.js PATHS /usr/share/javascript/dygraphs NO_DEFAULT_PATH REQUIRED)
find_file(dygraphs_licence copyright PATHS /usr/share/doc/libjs-dygraphs NO_DEFAULT_PATH REQUIRED)

set(web_page ${CMAKE_CURRENT_SOURCE_DIR}/web/page)
set(web_files
  "/|text/html|${web_page}/index.html"
  "/style.css|text/css|${web_page}/style.css"
  "/icon.svg|image/svg+xml|${web_page}/icon.svg"
  "/app.js|text/javascript|${web_page}/app.js"
  "/charts.js|text/javascript|${web_page}/charts.js"
  "/dom.js|text/javascript|${web_page}/dom.js"
  "/format.js|text/javascript|${web_page}/format.js"
  "/ledger.js|text/javascript|${web_page}/ledger.js"
  "/lists.js|text/javascript|${web_page}/lists.js"
  "/live.js|text/javascript|${web_page}/live.js"
  "/machine.js|text/javascript|${web_page}/machine.js"
  "/signs.js|text/javascript|${web_page}/signs.js"
  "/dygraph.min.js|text/javascript|${dygraphs_dir}/dygraph.min.js"
  "/dygraph.css|text/css|${dygraphs_dir}/dygraph.min.css"
  "/licences/dygraphs.txt|text/plain|${dygraphs_licence}"
  "/api/v1/openapi.json|application/json|${CMAKE_CURRENT_SOURCE_DIR}/web/openapi.json"
)
set(web_sources "")
foreach(entry IN LISTS web_files)
  string(REGEX REPLACE ".*\\|" "" file "${entry}")
  list(APPEND web_sources ${file})
endforeach()

set(web_embedded ${CMAKE_CURRENT_BINARY_DIR}/embedded_files.cpp)
add_custom_command(OUTPUT ${web_embedded}
  COMMAND ${CMAKE_COMMAND} -DOUT=${web_embedded} "-DFILES=${web_files}"
          -P ${CMAKE_CURRENT_SOURCE_DIR}/web/embed.cmake
  DEPENDS ${web_sources} ${CMAKE_CURRENT_SOURCE_DIR}/web/embed.cmake
  COMMENT "Embedding the page" VERBATIM)
# A literal longer than the standard demands of a compiler: both of ours take it.
set_source_files_properties(${web_embedded} PROPERTIES COMPILE_OPTIONS -Wno-overlength-strings)
