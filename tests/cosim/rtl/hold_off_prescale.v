// From a condition to firings: edge detector, hold-off down-counter, prescaler.
// `condition` comes from registers and speaks, after rising edge s, of sample s; so do the outputs.
// They are one clock wide.
`default_nettype none
module hold_off_prescale (
    input  wire        clk,
    input  wire        rst,          // active high, synchronous
    input  wire        condition,
    input  wire [31:0] hold_off,     // samples ignored after a firing that it let through
    input  wire        rearm_level,  // 1: a condition still true fires again when hold-off ends
    input  wire [31:0] prescale,     // n: the n-th, 2n-th, 3n-th... passes; at least 1
    output wire        fire,
    output wire        held_off,     // an edge that hold-off stopped
    output wire        prescaled     // a firing that the prescaler stopped
);
  reg        previous;  // the condition one sample ago
  reg [31:0] dead;      // samples of hold-off still to come
  reg [31:0] skipped;   // firings since the last one that passed the prescaler

  wire rising   = condition & ~previous;
  wire dead_now = dead != 32'd0;
  wire accepted = ~dead_now & (rising | (rearm_level & condition));
  wire last     = skipped == prescale - 32'd1;

  assign fire      = accepted & last;
  assign prescaled = accepted & ~last;
  assign held_off  = rising & dead_now;

  always @(posedge clk) begin
    if (rst) begin
      previous <= 1'b0;
      dead     <= 32'd0;
      skipped  <= 32'd0;
    end else begin
      previous <= condition;
      if (accepted) begin
        dead    <= hold_off;
        skipped <= last ? 32'd0 : skipped + 32'd1;
      end else if (dead_now) begin
        dead <= dead - 32'd1;
      end
    end
  end
endmodule
`default_nettype wire
