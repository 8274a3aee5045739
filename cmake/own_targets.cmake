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
        # False alarms about std::string in g++ 12 (GCC bug 105651).
        $<$<AND:$<CXX_COMPILER_ID:GNU>,$<VERSION_LESS:$<CXX_COMPILER_VERSION>,13>>:-Wno-restrict>
        $<$<BOOL:${LEAT_WARNINGS_AS_ERRORS}>:-Werror>)
endif()
