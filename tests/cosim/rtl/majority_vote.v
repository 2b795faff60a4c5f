// Population count of the votes against the number of channels needed.
`default_nettype none
module majority_vote #(
    parameter CHANNELS = 4
) (
    input  wire [CHANNELS-1:0] votes,
    input  wire [4:0]          majority,
    output wire                enough
);
  integer c;
  reg [4:0] total;
  always @* begin
    total = 5'd0;
    for (c = 0; c < CHANNELS; c = c + 1) total = total + {4'd0, votes[c]};
  end
  assign enough = total >= majority;
endmodule
`default_nettype wire
