# The reference in HTML: the target leat_reference, where Doxygen is found. Not built by default.

find_package(Doxygen QUIET)
find_program(LEAT_AWK NAMES awk gawk mawk)
mark_as_advanced(LEAT_AWK)
if(NOT DOXYGEN_FOUND OR NOT LEAT_AWK)
    return()
endif()

# Writes the settings FILE for the headers under HEADERS, and the reference to OUTPUT.
function(leat_reference_settings file headers output)
    set(leat_reference_headers "${headers}")
    set(leat_reference_output "${output}")
    set(leat_reference_page "${PROJECT_SOURCE_DIR}/cmake/reference.md")
    set(leat_reference_filter "${PROJECT_SOURCE_DIR}/cmake/reference_filter.awk")
    set(leat_reference_awk "${LEAT_AWK}")
    configure_file("${PROJECT_SOURCE_DIR}/cmake/Doxyfile.in" "${file}" @ONLY)
endfunction()

leat_reference_settings("${PROJECT_BINARY_DIR}/Doxyfile" "${PROJECT_SOURCE_DIR}/include"
                        "${PROJECT_BINARY_DIR}/reference")
add_custom_target(leat_reference
    COMMAND ${CMAKE_COMMAND} -E make_directory "${PROJECT_BINARY_DIR}/reference"
    COMMAND "${DOXYGEN_EXECUTABLE}" "${PROJECT_BINARY_DIR}/Doxyfile"
    COMMENT "Writing ${PROJECT_BINARY_DIR}/reference/html/index.html" VERBATIM)
