# All of Verilator's warnings on the reference triggers, at the defaults and at the smallest and
# the largest window. Arguments: VERILATOR, RTL
function(lint top)
  execute_process(COMMAND ${VERILATOR} --lint-only -Wall --top-module ${top} ${ARGN} -y ${RTL} ${RTL}/${top}.v
                  COMMAND_ERROR_IS_FATAL ANY)
endfunction()

lint(threshold)
foreach(samples 1 2 150 65536)
  lint(time_over_threshold -GWINDOW=${samples} -GMIN_OVER=1)
  lint(boxcar_sum -GLENGTH=${samples})
endforeach()
foreach(kind 0 1 2)
  lint(trigger_probe -GKIND=${kind} -GCHANNELS=16)
endforeach()
