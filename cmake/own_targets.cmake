# Warnings for the project's own programs. Never exported: leat::leat carries no flags.

add_library(leat_own INTERFACE)
target_link_libraries(leat_own INTERFACE leat::leat)
if(MSVC)
    target_compile_options(leat_own INTERFACE /W4 /permissive-
        $<$<BOOL:${LEAT_WARNINGS_AS_ERRORS}>:/WX>)
else()
    target_compile_options(leat_own INTERFACE
        -Wall -Wextra -Wpedantic -Wconversion -Wsign-conversion -Wshadow -Wold-style-cast
        $<$<CXX_COMPILER_ID:GNU>:-Wuseless-cast>
        $<$<BOOL:${LEAT_WARNINGS_AS_ERRORS}>:-Werror>)
endif()
