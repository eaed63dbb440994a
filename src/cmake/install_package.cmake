# Installs program, library and headers, and the package that find_package(gapwright) finds.
include(CMakePackageConfigHelpers)
include(GNUInstallDirs)

set(package_folder ${CMAKE_INSTALL_LIBDIR}/cmake/gapwright)

install(TARGETS gapwright_program RUNTIME DESTINATION ${CMAKE_INSTALL_BINDIR})
install(TARGETS gapwright EXPORT gapwright_targets
        ARCHIVE DESTINATION ${CMAKE_INSTALL_LIBDIR} LIBRARY DESTINATION ${CMAKE_INSTALL_LIBDIR})
install(DIRECTORY ${PROJECT_SOURCE_DIR}/include/gapwright DESTINATION ${CMAKE_INSTALL_INCLUDEDIR})
install(EXPORT gapwright_targets NAMESPACE gapwright:: DESTINATION ${package_folder})

# Parts of a report: ours, and of the packages what a page holds, where they are there.
set(report_parts ${CMAKE_CURRENT_SOURCE_DIR}/report/web)
set(report_share ${CMAKE_INSTALL_DATADIR}/gapwright/report)
install(DIRECTORY ${report_parts}/ DESTINATION ${report_share}
        PATTERN node_modules EXCLUDE)
foreach(part vega/build/vega.min.js vega-lite/build/vega-lite.min.js vega-lite/LICENSE
        tabulator-tables/dist/js/tabulator.min.js tabulator-tables/dist/css/tabulator.min.css
        tabulator-tables/LICENSE)
  get_filename_component(folder ${part} DIRECTORY)
  install(FILES ${report_parts}/node_modules/${part}
          DESTINATION ${report_share}/node_modules/${folder} OPTIONAL)
endforeach()

configure_package_config_file(${CMAKE_CURRENT_LIST_DIR}/gapwrightConfig.cmake.in
  ${CMAKE_CURRENT_BINARY_DIR}/gapwrightConfig.cmake INSTALL_DESTINATION ${package_folder})
write_basic_package_version_file(${CMAKE_CURRENT_BINARY_DIR}/gapwrightConfigVersion.cmake
  COMPATIBILITY SameMinorVersion)
install(FILES ${CMAKE_CURRENT_BINARY_DIR}/gapwrightConfig.cmake
              ${CMAKE_CURRENT_BINARY_DIR}/gapwrightConfigVersion.cmake
        DESTINATION ${package_folder})
