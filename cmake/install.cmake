# Installation: the headers, a CMake package and a pkg-config file. Nothing of it names an absolute
# path, so that an installed tree can be moved.

include(GNUInstallDirs)
include(CMakePackageConfigHelpers)

install(DIRECTORY include/leat DESTINATION "${CMAKE_INSTALL_INCLUDEDIR}")
install(FILES LICENSE DESTINATION "${CMAKE_INSTALL_DATADIR}/licenses/leat")

# ---- CMake: find_package(leat CONFIG), find_package(leat CONFIG COMPONENTS json) ----

set(package_dir "${CMAKE_INSTALL_DATADIR}/cmake/leat")

install(TARGETS leat EXPORT leat-targets INCLUDES DESTINATION "${CMAKE_INSTALL_INCLUDEDIR}")
install(EXPORT leat-targets NAMESPACE leat:: DESTINATION "${package_dir}")
install(TARGETS leat_json EXPORT leat-json-targets)
install(EXPORT leat-json-targets NAMESPACE leat:: DESTINATION "${package_dir}")
configure_package_config_file(cmake/leat-config.cmake.in leat-config.cmake
                              INSTALL_DESTINATION "${package_dir}")
# Sequences may change with the major version, below 1.0 with the minor one: another is refused.
if(PROJECT_VERSION_MAJOR EQUAL 0)
    set(compatibility SameMinorVersion)
else()
    set(compatibility SameMajorVersion)
endif()
write_basic_package_version_file(leat-config-version.cmake
                                 COMPATIBILITY ${compatibility} ARCH_INDEPENDENT)
install(FILES "${CMAKE_CURRENT_BINARY_DIR}/leat-config.cmake"
              "${CMAKE_CURRENT_BINARY_DIR}/leat-config-version.cmake"
        DESTINATION "${package_dir}")

# ---- pkg-config: an include folder, no library ----

if(IS_ABSOLUTE "${CMAKE_INSTALL_INCLUDEDIR}")
    set(leat_pc_include "${CMAKE_INSTALL_INCLUDEDIR}")
else()
    file(RELATIVE_PATH leat_pc_include "/prefix/${CMAKE_INSTALL_DATADIR}/pkgconfig"
         "/prefix/${CMAKE_INSTALL_INCLUDEDIR}")
    string(PREPEND leat_pc_include "\${pcfiledir}/")
endif()
configure_file(cmake/leat.pc.in leat.pc @ONLY)
install(FILES "${CMAKE_CURRENT_BINARY_DIR}/leat.pc"
        DESTINATION "${CMAKE_INSTALL_DATADIR}/pkgconfig")
