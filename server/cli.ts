console.log("marl");
